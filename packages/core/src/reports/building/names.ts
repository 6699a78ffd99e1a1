import type { LittleGroup } from "../../kvectors/index.js";
import { formatRational, type RationalVector, roundNumber } from "../../numbers/index.js";
import { type Cell, formatTriplet, type SpaceGroup } from "../../spacegroups/index.js";
import type { CellRecord, GroupRecord, LittleGroupRecord } from "../records/common.js";

/** How the group is called, as the JSON contract writes it. */
export function groupRecord({ name }: SpaceGroup): GroupRecord {
  return {
    number: name.number,
    hall: name.hall,
    hermannMauguin: name.hermannMauguin,
    choice: name.choice,
    basisChange: name.basisChange,
  };
}

/** A cell for JSON: Å and degrees. */
export function cellRecord({ a, b, c, alpha, beta, gamma }: Cell): CellRecord {
  return {
    a: roundNumber(a),
    b: roundNumber(b),
    c: roundNumber(c),
    alpha: roundNumber(alpha),
    beta: roundNumber(beta),
    gamma: roundNumber(gamma),
  };
}

/** The little group with one written operator per coset of L. */
export function littleGroupRecord(group: SpaceGroup, little: LittleGroup): LittleGroupRecord {
  return {
    order: little.operators.length,
    symbol: little.symbol,
    operators: little.operators.map((index) => operatorText(group, index)),
  };
}

/** The coordinate triplet of an operator by its index. */
export function operatorText(group: SpaceGroup, index: number): string {
  const operator = group.operators[index];
  if (operator === undefined) throw new RangeError(`the group has no operator ${index}`);
  return formatTriplet(operator);
}

/** Exact coordinates as texts. */
export function positionRecord(position: RationalVector): string[] {
  return position.map(formatRational);
}
