import { test } from "vitest";
import { madeStudy, outcomeOf } from "../support/weigh-cases.js";
test("x", async () => {
  let ok = 0, n = 0; const all: number[] = []; let tm = 0, tw = 0, big = 0;
  const [a, b] = (process.env.SEEDS ?? "1,100").split(",").map(Number) as [number, number];
  for (let seed = a; seed <= b; seed++) {
    const t = performance.now();
    const study = await madeStudy(seed, { noise: 0.03, qMax: 5, scale: 50 });
    const t1 = performance.now(); tm += t1 - t;
    if (!study) { if (t1 - t > 1000) console.log("slow null", seed, t1 - t); continue; }
    const out = await outcomeOf(study);
    const t2 = performance.now(); tw += t2 - t1;
    n++; if (out.first) ok++;
    const w = out.weighing;
    all.push(...out.pulls); const bad = out.pulls.filter((p) => Math.abs(p) > 2.5);
    if (w.ranking[0]?.sameAs.length) big++;
    if (!out.first || bad.length || t2 - t > 3000) console.log(study.name, out.first, (t1 - t).toFixed(0), (t2 - t1).toFixed(0), study.data.data.length, w.ranking.slice(0, 4).map((r) => `${r.id} c ${r.criterion.toFixed(1)} chi2 ${r.chiSquared.toFixed(1)} p${r.parameters}/${r.amplitudes.length} hits ${r.hits}/${r.starts}/${r.minima.length}`).join(" | "), out.pulls.map((p) => p.toFixed(2)).join(" "), study.amplitudes.map((x) => x.toFixed(2)).join(" "), "fit", w.ranking.find((r) => r.id === study.truth.id)?.amplitudes.map((x) => `${x.value.toFixed(2)}(${x.uncertainty?.toFixed(2)})`).join(" "), w.struckOut.length);
  }
  console.log(ok, n, "ties", big, all.length, Math.sqrt(all.reduce((x, y) => x + y * y, 0) / all.length), all.filter((p) => Math.abs(p) < 2.5).length / all.length, "make", tm.toFixed(0), "weigh", tw.toFixed(0));
}, 400000);
