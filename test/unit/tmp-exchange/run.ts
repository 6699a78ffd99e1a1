import { readFileSync } from "node:fs";
import { answer } from "../../../packages/core/src/job/index.js";
import { reportText, reportCsv } from "../../../packages/core/src/reports/index.js";
const request = JSON.parse(process.argv[2]!);
const a = await answer(request, { readText: async (p: string) => readFileSync(p, "utf8") });
console.log(a.errors.length ? JSON.stringify(a.errors, null, 1) : process.argv[3]==="json" ? JSON.stringify(a,null,1) : process.argv[3]==="csv" ? reportCsv(a) : reportText(a));
