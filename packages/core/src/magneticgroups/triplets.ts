import { fail } from "../errors/index.js";
import { formatTriplet, parseTriplet } from "../spacegroups/index.js";
import type { MagneticOperator } from "./types.js";

/**
 * Reads a coordinate triplet with its time reversal, `-x,y+1/2,-z,-1`: the last field is `+1`, `1` or `-1` as in the
 * magnetic dictionary of the IUCr (`_space_group_symop_magn_operation.xyz`). Translations are kept as written.
 *
 * @param column place of the first character, for errors
 * @throws `syntax` with the column
 */
export function parseMagneticTriplet(text: string, column = 1): MagneticOperator {
  const comma = text.lastIndexOf(",");
  const last = text.slice(comma + 1);
  const reversal = last.trim().replace("\u2212", "-");
  if (text.split(",").length !== 4 || !/^[+-]?1$/.test(reversal))
    fail("syntax", `cannot read \`${text.trim()}\` as an operator with time reversal`, {
      where: { column: column + comma + 1 + (last.length - last.trimStart().length) },
      expected: "three coordinates and +1 or -1 behind a third comma, for example -x,y+1/2,-z,-1",
      found: text.trim() === "" ? "nothing" : text.trim(),
    });
  return {
    operator: parseTriplet(text.slice(0, comma), column),
    timeReversal: reversal === "-1" ? -1 : 1,
  };
}

/** `-x,y+1/2,-z,-1`. `parseMagneticTriplet` reads it back. */
export function formatMagneticTriplet({ operator, timeReversal }: MagneticOperator): string {
  return `${formatTriplet(operator)},${timeReversal === 1 ? "+1" : "-1"}`;
}
