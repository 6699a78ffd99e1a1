import { writeFileSync } from "node:fs";
import { test } from "vitest";
import { kvane } from "../../cli/command.js";
const words=(line: string)=>[...line.matchAll(/"([^"]*)"|(\S+)/g)].map(m=>m[1]??m[2] as string);
test("x", async ()=>{
  let out="";
  for (const line of [
    'exchange "P 6/m m m" --cell "6 6 20 90 90 120" --site "M 1/2 0 0" --shells 3',
    'exchange "P 4/m m m" --cell "20 20 3 90 90 90" --site "M 0 0 0" --j "1 1" --j "2 0.5" --k 0,0,0.29',
    'exchange "P 4/m m m" --cell "4 4 40 90 90 90" --site "M 0 0 0" --j "1 1" --j "3 0.2" --vary "2 0 1 21"',
    'exchange "P 6/m m m" --cell "4 4 40 90 90 120" --site "M 1/3 2/3 0" --j "1 1" --j "2 0.3"',
    'exchange "F d -3 m:2" --cell "10 10 10 90 90 90" --site "A 3/8 3/8 3/8" --site "B 0 0 0" --j "1 0.5" --j "2 1"',
    "onset --example",
    "help exchange", "help onset", "help commands", "exchange --help", "onset --help",
  ]) { const t0=performance.now(); const r=await kvane(words(line)); out+=`\n$$ ${line}   ${r.status} ${(performance.now()-t0).toFixed(0)}\n${r.stdout}${r.stderr}`; }
  writeFileSync("/tmp/kv/gen.txt", out);
}, 120000);
