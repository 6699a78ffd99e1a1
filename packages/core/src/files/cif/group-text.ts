import { KvaneError } from "../../errors/index.js";
import { formatTriplet, latticeVectorsInCell, parseGroup, type SpaceGroup } from "../../spacegroups/index.js";

/** True when two groups are the same operators in the same axes. */
export function sameGroup(a: SpaceGroup, b: SpaceGroup): boolean {
  return JSON.stringify([a.lattice, a.operators]) === JSON.stringify([b.lattice, b.operators]);
}

/**
 * A text from which `parseGroup` makes exactly this group: its Hermann–Mauguin symbol with the code of the setting
 * where that does, else its Hall symbol, else operators that generate it.
 */
export function groupText(group: SpaceGroup): string {
  const { hermannMauguin, choice, hall, basisChange } = group.name;
  const change = basisChange === "a,b,c;0,0,0" ? "" : ` (${basisChange})`;
  const names = [
    ...(hermannMauguin === null ? [] : [`${hermannMauguin}${choice === "" ? "" : `:${choice}`}${change}`]),
    ...(hall === null ? [] : [`hall:${hall}${change}`]),
  ];
  return names.find((name) => gives(name, group)) ?? generatorText(group);
}

function gives(text: string, group: SpaceGroup): boolean {
  try {
    return sameGroup(parseGroup(text), group);
  } catch (error) {
    if (error instanceof KvaneError) return false;
    throw error;
  }
}

/** Centring vectors and as few operators as the order of the list allows, `x,y,z; x+1/2,y,z+1/2; -x,…`. */
function generatorText(group: SpaceGroup): string {
  const centring = latticeVectorsInCell(group).map(([x, y, z]) => `x${plus(x)},y${plus(y)},z${plus(z)}`);
  const chosen = [...centring];
  let known = parseGroup(chosen.join(";"));
  for (const operator of group.operators) {
    if (known.operators.length === group.operators.length) break;
    const triplet = formatTriplet(operator);
    if (known.operators.some((one) => formatTriplet(one) === triplet)) continue;
    chosen.push(triplet);
    known = parseGroup(chosen.join(";"));
  }
  return chosen.join("; ");
}

function plus([numerator, denominator]: readonly [number, number]): string {
  return numerator === 0 ? "" : `+${numerator}/${denominator}`;
}
