import { fitSeries } from "../../../packages/core/src/onsets/fit-series.js";
import { seeded } from "../../support/random.js";
import { madeScan } from "../../support/scans.js";
    const random = seeded(8_400_000 + 37);
    const peak = (name: string, transition: number) => {
      const law={ transition, beta: 0.15 + 0.35 * random.next(), amplitude: 60 + 40 * random.next(), background: 5 }; console.log(law);
      return madeScan(name, law, { from: 30, to: 50, step: 0.25 }, () => 2, random); };
    const p=[peak("a", 40), peak("b", 42), peak("c", 40)];
    const f=[0,2].map(i=>fitSeries(p[i]!));
    for (let t=39.5;t<40.5;t+=0.025) console.log(t.toFixed(3), f.map(x=>x.profile!(t).toFixed(2)).join(" "), f.reduce((s,x)=>s+x.profile!(t),0).toFixed(2));
