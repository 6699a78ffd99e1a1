import { fail, whyNoNumber } from "../../errors/index.js";
import { argumentNames, type Request, type RequestField } from "../request.js";
import { optionOf } from "./given.js";

/** What a numeric option may be. */
export interface NumberRange {
  readonly above?: number;
  readonly from?: number;
  readonly to?: number;
  readonly below?: number;
  readonly whole?: boolean;
}

/**
 * The number of a numeric option, null when it was not given. Throws `invalid-number` with the option's name for text,
 * NaN, infinities and values out of range.
 */
export function numberOption(request: Request, field: RequestField, range: NumberRange = {}): number | null {
  const given = optionOf(request, field);
  if (given === null) return null;
  const value = /^[+-]?(\d+(?:\.\d*)?|\.\d+)(e[+-]?\d+)?$/i.test(given.text) ? Number(given.text) : Number.NaN;
  if (!Number.isFinite(value) || !inRange(value, range))
    fail("invalid-number", `${argumentNames[field]} ${whyNoNumber(given.text, "is no number that can be used")}`, {
      where: given.where,
      expected: rangeText(range),
      found: given.text === "" ? "nothing" : given.text,
      remedy: `give ${argumentNames[field]} ${rangeText(range)}`,
    });
  return value;
}

function inRange(value: number, { above, from, to, below, whole }: NumberRange): boolean {
  if (above !== undefined && !(value > above)) return false;
  if (from !== undefined && !(value >= from)) return false;
  if (to !== undefined && !(value <= to)) return false;
  if (below !== undefined && !(value < below)) return false;
  return !whole || Number.isInteger(value);
}

function rangeText({ above, from, to, below, whole }: NumberRange): string {
  const kind = whole ? "a whole number" : "a number";
  if (from !== undefined && to !== undefined) return `${kind} from ${from} to ${to}`;
  if (from !== undefined && below !== undefined) return `${kind} from ${from} to less than ${below}`;
  if (above !== undefined && to !== undefined) return `${kind} above ${above} and up to ${to}`;
  if (from !== undefined) return `${kind} not below ${from}`;
  return above === undefined ? kind : `${kind} above ${above}`;
}
