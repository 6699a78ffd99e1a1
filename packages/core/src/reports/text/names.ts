import { fixedNumber, withUncertainty } from "../../numbers/index.js";
import type { CellRecord, GroupRecord, KRecord } from "../records/common.js";

/** `P n m a (number 62, Hall -P 2ac 2n)`, with the change of basis where there is one. */
export function groupText(group: GroupRecord): string {
  const name = group.hermannMauguin ?? group.hall ?? "given by its operators";
  const choice = group.choice === "" ? "" : `:${group.choice}`;
  const details = [
    group.number === null ? "" : `number ${group.number}`,
    group.hall === null || group.hermannMauguin === null ? "" : `Hall ${group.hall}`,
    group.basisChange === "a,b,c;0,0,0" ? "" : `in the basis (${group.basisChange})`,
  ].filter((text) => text !== "");
  return `${name}${choice}${details.length > 0 ? ` (${details.join(", ")})` : ""}`;
}

/** `(0, u, 1/2)`, with the values of the letters behind it: `(0, u, 0), u = 0.4720(4)`. */
export function kText(k: KRecord): string {
  const values = Object.entries(k.values).map(
    ([letter, value]) => `${letter} = ${measured(value, k.su[letter] ?? null)}`,
  );
  return [kForm(k), ...values].join(", ");
}

/**
 * The values in place of the letters: `(0, 0.4720(4), 0)`; without uncertainties, and in components with more than a
 * letter, numbers to four decimals.
 */
export function kShort(k: KRecord): string {
  const components = k.components.map((component, axis) => {
    const value = k.values[component];
    const su = k.su[component];
    if (value !== undefined && su !== undefined) return withUncertainty(value, su);
    return /[uvw]/.test(component) && k.numeric !== null
      ? plain(Number((k.numeric[axis] ?? Number.NaN).toFixed(4)))
      : component;
  });
  return `(${components.join(", ")})`;
}

function measured(value: number, su: number | null): string {
  return su === null ? plain(value) : withUncertainty(value, su);
}

/** The components alone. */
export function kForm(k: KRecord): string {
  return `(${k.components.join(", ")})`;
}

const kinds = ["point", "line", "plane", "general position"];

/** What a manifold of that dimension is called. */
export function dimensionText(dimension: number): string {
  return kinds[dimension] ?? String(dimension);
}

/** Exact coordinates: `(0, 1/2, 0.137)`. */
export function positionText(position: readonly string[]): string {
  return `(${position.map(coordinateText).join(", ")})`;
}

/** Denominators of special positions: these stay fractions. */
const usualDenominators: readonly number[] = [1, 2, 3, 4, 6, 8, 12, 16, 24];

/** A fraction that was written as a decimal reads better as one: 137/1000 is 0.137, exactly. */
function coordinateText(fraction: string): string {
  const [numerator, denominator = "1"] = fraction.split("/");
  const bottom = Number(denominator);
  if (usualDenominators.includes(bottom) || !/^2*5*$/.test(factors(bottom))) return fraction;
  return String(Number(numerator) / bottom);
}

/** The prime factors 2 and 5, then whatever is left. */
function factors(value: number): string {
  let rest = value;
  let text = "";
  for (const prime of [2, 5])
    while (rest % prime === 0) {
      rest /= prime;
      text += prime;
    }
  return rest === 1 ? text : `${text}x`;
}

export function cellText(cell: CellRecord): string {
  const lengths = [cell.a, cell.b, cell.c].map((length) => plain(length)).join(", ");
  return `${lengths} Å; ${[cell.alpha, cell.beta, cell.gamma].map((angle) => plain(angle)).join(", ")}°`;
}

/** A number as short as it is exact to six decimals. */
export function plain(value: number): string {
  return String(Number(value.toFixed(6)) + 0);
}

/** A fixed number of decimals, `–` where there is none. */
export function decimals(value: number | null, places: number): string {
  return value === null ? "–" : fixedNumber(value, places);
}

export function minusKText(minusK: "equivalent" | "in star" | "not in star"): string {
  if (minusK === "equivalent") return "equivalent to k (2k is a reciprocal lattice vector)";
  if (minusK === "in star") return "another arm of the star of k";
  return "of another star; real moments need both";
}

/** `1 arm`, `4 arms`. */
export function counted(count: number, singular: string, plural = `${singular}s`): string {
  return `${count} ${count === 1 ? singular : plural}`;
}
