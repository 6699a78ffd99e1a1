// @ts-check
import { houseRules } from "./house-rules.mjs";

const problems = Object.values(houseRules).flatMap((rule) => rule());
for (const problem of problems) console.error(problem);
if (problems.length > 0) process.exitCode = 1;
