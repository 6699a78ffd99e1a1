/**
 * The full sweeps, `npm run certify`: every check of test/sweep and test/laws without sampling. A broken run goes on
 * where it was as long as the code that a subject reaches stays the same. When all units of a subject are done, docs/validation.md
 * gets the table. `npm run certify -- symmetry` runs one subject and puts its rows into the table;
 * `npm run certify -- points random` runs these sweeps only, and writes nothing.
 */
import { subject as configurations } from "./configurations.js";
import { subject as exchange } from "./exchange.js";
import { subject as magneticGroups } from "./magnetic-groups.js";
import { writeReport } from "./report.js";
import { keepResults, type SubjectResult, subjectResult } from "./results.js";
import { subject as search } from "./search.js";
import { openState } from "./state.js";
import { type Subject, unitName } from "./subject.js";
import { subject as symmetry } from "./symmetry.js";
import { subject as weighing } from "./weighing.js";

const subjects: readonly Subject[] = [symmetry, magneticGroups, configurations, search, weighing, exchange];

const wanted = process.argv.slice(2);
const names = subjects.flatMap(({ name, sweeps }) => [name, ...Object.keys(sweeps)]);
const unknown = wanted.filter((name) => !names.includes(name));
if (unknown.length > 0) throw new Error(`no sweep is called ${unknown.join(", ")}; there are ${names.join(", ")}`);

const done: SubjectResult[] = [];
let failures = 0;
for (const subject of subjects) {
  const chosen = subject
    .units()
    .filter(({ sweep }) => wanted.length === 0 || wanted.includes(sweep) || wanted.includes(subject.name));
  if (chosen.length === 0) continue;
  const state = await openState(subject.name);
  const open = chosen.filter((unit) => !state.done.has(unitName(unit)));
  console.log(`${subject.name}: ${chosen.length - open.length} of ${chosen.length} units are done already`);
  for (const [index, unit] of open.entries()) {
    const counts = await unit.run();
    state.keep(unitName(unit), counts);
    for (const problem of counts.problems) console.error(`FAILED ${problem}`);
    if (index % 20 === 19 || index === open.length - 1)
      console.log(`${index + 1} of ${open.length}: ${unitName(unit)}`);
  }
  if (subject.units().every((unit) => state.done.has(unitName(unit)))) done.push(subjectResult(subject, state));
  failures += chosen.reduce((sum, unit) => sum + (state.done.get(unitName(unit))?.problems.length ?? 0), 0);
}
console.log(`${failures} failures`);
if (done.length > 0) console.log(`written: ${writeReport(keepResults(done, subjects))}`);
if (failures > 0) process.exitCode = 1;
