import { analyseScan } from "../../../packages/core/src/onsets/index.js";
import { seeded } from "../../support/random.js";
import { madeScan } from "../../support/scans.js";
for (let seed = 0; seed < 40; seed++) {
    const random = seeded(8_400_000 + seed);
    const laws: any[]=[];
    const peak = (name: string, transition: number) => {
      const law={ transition, beta: 0.15 + 0.35 * random.next(), amplitude: 60 + 40 * random.next(), background: 5 }; laws.push(law);
      return madeScan(name, law, { from: 2, to: 50, step: 0.25 }, () => 2, random); };
    const r = analyseScan([peak("a", 40), peak("b", 42), peak("c", 40)]);
    const t=r.transitions;
    if (!(t.length === 2 && t[0]?.series.join() === "0,2")) console.log(seed, JSON.stringify(t.map(x=>[x.temperature, x.series, x.probability])), r.peaks.map((p,i)=>`${p.fit?.transition.value.toFixed(2)}(${p.fit?.transition.su?.toFixed(2)}) b ${p.fit?.beta.value.toFixed(2)}(${p.fit?.beta.su?.toFixed(2)}) [${laws[i].beta.toFixed(2)}] r ${p.fit?.reducedRange.toFixed(2)}`).join(" ; "));
}
