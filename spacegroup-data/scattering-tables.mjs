// @ts-check
/**
 * What scatters neutrons: magnetic form factors and nuclear scattering lengths, from the readable tables of this folder
 * to texts that core takes apart when they are needed.
 */
import { readFileSync } from "node:fs";
import { join } from "node:path";

const decimal = /^-?\d+(?:\.\d+)?$/;

/**
 * @param {string} folder
 * @param {string} name
 * @returns {{fields: string[], fault: (what: string) => Error}[]}
 */
function readLines(folder, name) {
  return readFileSync(join(folder, name), "utf8")
    .split(/\r?\n/)
    .flatMap((line, index) => {
      if (line.trim() === "" || line.startsWith("#")) return [];
      const fault = (/** @type {string} */ what) => new Error(`${name}, line ${index + 1}: ${what}: \`${line}\``);
      return [{ fields: line.trim().split(/\s+/), fault }];
    });
}

/** @param {string} folder */
function formFactorRows(folder) {
  /** @type {Map<string, Map<string, string>>} */
  const ions = new Map();
  for (const { fields, fault } of readLines(folder, "form-factors.txt")) {
    const [ion = "", integral = "", ...coefficients] = fields;
    if (!/^[A-Z][a-z]?(?:0|[1-9]\+)$/.test(ion) || !/^j[0246]$/.test(integral))
      throw fault("not an ion and an integral");
    if (coefficients.length !== 7 || !coefficients.every((text) => decimal.test(text))) throw fault("not 7 numbers");
    // <j0>(0) = A + B + C + D = 1: the moment itself.
    const atZero = [0, 2, 4, 6].reduce((sum, at) => sum + Number(coefficients[at]), 0);
    if (integral === "j0" && Math.abs(atZero - 1) > 0.01)
      throw fault(`<j0> is ${atZero.toFixed(4)} at s = 0, and not 1`);
    const known = ions.get(ion) ?? new Map();
    if (known.has(integral)) throw fault("twice");
    ions.set(ion, known.set(integral, coefficients.join(" ")));
  }
  return [...ions].map(([ion, integrals]) => {
    if (!integrals.has("j0")) throw new Error(`form-factors.txt: ${ion} has no j0`);
    return [ion, ...["j0", "j2", "j4", "j6"].map((integral) => integrals.get(integral) ?? "")].join("|");
  });
}

/** @param {string} folder */
function scatteringLengthRows(folder) {
  const seen = new Set();
  return readLines(folder, "scattering-lengths.txt").map(({ fields, fault }) => {
    const [nucleus = "", real = "", imaginary = "", energy = ""] = fields;
    const numbers = [real, imaginary].every((text) => decimal.test(text));
    if (!/^\d*[A-Z][a-z]?$/.test(nucleus) || !numbers || !["", "E"].includes(energy)) throw fault("not a nucleus");
    if (seen.has(nucleus)) throw fault("twice");
    seen.add(nucleus);
    return [nucleus, real, imaginary, energy].join("|");
  });
}

/**
 * The generated files: target in core, name of the source, text.
 * @param {string} folder
 */
export function scatteringTables(folder) {
  const origin = (/** @type {string} */ name) =>
    `// Made by spacegroup-data/generate.mjs from spacegroup-data/${name}; edit that file and run \`npm run data\`.\n\n`;
  return [
    {
      target: "packages/core/src/diffraction/generated/form-factors.ts",
      source: "form-factors.txt",
      output: `${origin("form-factors.txt")}/** ion|<j0>|<j2>|<j4>|<j6>, each \`A a B b C c D\` or empty; one row an ion. */
export const formFactorRows = \`${formFactorRows(folder).join("\n")}\`;
`,
    },
    {
      target: "packages/core/src/diffraction/generated/scattering-lengths.ts",
      source: "scattering-lengths.txt",
      output: `${origin("scattering-lengths.txt")}/** nucleus|real|imaginary|E where it depends on the energy; fm, one row an element or isotope. */
export const scatteringLengthRows = \`${scatteringLengthRows(folder).join("\n")}\`;
`,
    },
  ];
}
