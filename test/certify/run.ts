/**
 * The full sweeps, `npm run certify`: every check of test/sweep and test/laws without sampling. A broken run goes on
 * where it was as long as the sources stay the same. When all units are done, docs/validation.md gets the table.
 * `npm run certify -- points random` runs these sweeps only and writes nothing.
 */
import { unitName, writeReport } from "./report.js";
import { openState } from "./state.js";
import { allUnits, sweeps } from "./units.js";

const wanted = process.argv.slice(2);
const unknown = wanted.filter((name) => !(name in sweeps));
if (unknown.length > 0)
  throw new Error(`no sweep is called ${unknown.join(", ")}; there are ${Object.keys(sweeps).join(", ")}`);

const state = openState();
const units = allUnits();
const chosen = units.filter((unit) => wanted.length === 0 || wanted.includes(unit.sweep));
const open = chosen.filter((unit) => !state.done.has(unitName(unit)));
if (open.length < chosen.length)
  console.log(`${chosen.length - open.length} of ${chosen.length} units are done already`);
open.forEach((unit, index) => {
  const counts = unit.run();
  state.keep(unitName(unit), counts);
  for (const problem of counts.problems) console.error(`FAILED ${problem}`);
  if (index % 20 === 19 || index === open.length - 1) console.log(`${index + 1} of ${open.length}: ${unitName(unit)}`);
});
const failures = chosen.reduce((sum, unit) => sum + (state.done.get(unitName(unit))?.problems.length ?? 0), 0);
console.log(`${chosen.length} units, ${failures} failures`);
if (wanted.length === 0) console.log(`written: ${writeReport(units, state)}`);
if (failures > 0) process.exitCode = 1;
