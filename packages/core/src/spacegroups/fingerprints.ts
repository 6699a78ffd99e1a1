import { changeBasis } from "./change-basis.js";
import { groupFromHall, parseHallOperator } from "./hall-groups.js";
import { parseHallSymbol } from "./hall-symbols.js";
import type { SpaceGroup } from "./types.js";

/**
 * A short hash of lattice and operators (FNV-1a, 32 bits, base 36). Groups with one set of operators have one
 * fingerprint; the reverse is checked by comparing the operators themselves.
 */
export function groupFingerprint(group: SpaceGroup): string {
  let hash = 0x811c9dc5;
  for (const character of operatorText(group)) {
    hash ^= character.charCodeAt(0);
    hash = Math.imul(hash, 0x01000193);
  }
  return (hash >>> 0).toString(36);
}

/** True when two groups consist of the same operators in the same axes. */
export function sameOperators(a: SpaceGroup, b: SpaceGroup): boolean {
  return operatorText(a) === operatorText(b);
}

function operatorText({ lattice, operators }: SpaceGroup): string {
  return JSON.stringify([lattice.vectors, lattice.denominator, operators.map((operator) => Object.values(operator))]);
}

/** The fingerprint of a tabulated Hall symbol, for the generated table. */
export function hallFingerprint(symbol: string): string {
  return groupFingerprint(groupFromHallText(symbol));
}

/** The group of a whole Hall symbol, change of basis included, without a name. */
export function groupFromHallText(symbol: string): SpaceGroup {
  const bracket = symbol.indexOf("(");
  const head = bracket < 0 ? symbol : symbol.slice(0, bracket);
  const group = groupFromHall(parseHallSymbol(head));
  return bracket < 0
    ? group
    : changeBasis(group, parseHallOperator(symbol.slice(bracket + 1, symbol.lastIndexOf(")")), bracket + 2));
}
