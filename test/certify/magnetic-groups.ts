import { magneticRowProblems } from "../support/magnetic-sweep.js";
import { magneticRows } from "../support/magnetic-table.js";
import { seeded } from "../support/random.js";
import type { Subject, Unit } from "./subject.js";

const seed = 108;
const rowsPerUnit = 50;

/** The identification of magnetic groups without sampling. */
export const subject: Subject = {
  name: "magnetic-groups",
  sweeps: {
    types: { what: "1651 types of magnetic groups, each as it stands and in 5 random bases and origins", seed },
  },
  units: () => {
    const rows = magneticRows();
    return Array.from(
      { length: Math.ceil(rows.length / rowsPerUnit) },
      (_, index): Unit => ({
        sweep: "types",
        number: index * rowsPerUnit + 1,
        run: () => {
          const part = rows.slice(index * rowsPerUnit, (index + 1) * rowsPerUnit);
          const random = seeded(1000 * seed + index);
          return { cases: 6 * part.length, problems: part.flatMap((row) => magneticRowProblems(row, random, 5)) };
        },
      }),
    );
  },
};
