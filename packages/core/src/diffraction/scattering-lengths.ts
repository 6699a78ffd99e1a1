import { fail } from "../errors/index.js";
import { scatteringLengthRows } from "./generated/scattering-lengths.js";

/** Bound coherent scattering length of a nucleus. */
export interface ScatteringLength {
  /** `Fe`, `11B`. */
  readonly nucleus: string;
  /** fm. */
  readonly real: number;
  /** fm; negative for absorbing nuclei. */
  readonly imaginary: number;
  /** Whether it depends on the neutron energy near resonances; the number is for thermal neutrons. */
  readonly dependsOnEnergy: boolean;
}

/**
 * The length of an element in its natural mixture (`O`, also with a charge: `O2-`) or of an isotope (`11B`; D and T are
 * 2H and 3H). Source: spacegroup-data/SOURCES.md. Throws `invalid-argument` for a nucleus that is not in the table.
 */
export function scatteringLength(name: string): ScatteringLength {
  const plain = name
    .trim()
    .replace(/\d{0,2}[+-]$/, "")
    .replace(/(?<=[A-Za-z])0$/, "");
  const nucleus = { D: "2H", T: "3H" }[plain] ?? plain;
  const row = scatteringLengthRows.split("\n").find((text) => text.startsWith(`${nucleus}|`));
  if (row === undefined)
    fail("invalid-argument", `there is no scattering length of \`${name}\` in the table`, {
      expected: "an element such as O, or an isotope such as 11B",
      found: name,
      remedy: "give the length itself in fm",
    });
  const [, real, imaginary, energy] = row.split("|");
  return { nucleus, real: Number(real), imaginary: Number(imaginary), dependsOnEnergy: energy === "E" };
}
