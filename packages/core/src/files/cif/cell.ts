import {
  type Assumption,
  fail,
  KvaneError,
  type Place,
  type Problem,
  problem,
  whyNoNumber,
} from "../../errors/index.js";
import { type Cell, checkCell } from "../../spacegroups/index.js";
import { isMeasurable, measurableText } from "../measurable.js";
import { type BlockReader, locate } from "./block-reader.js";
import type { CifValue } from "./document.js";
import { type CifNumber, numberOf } from "./numbers.js";
import { blockPlace, placeIn } from "./places.js";
import { isInapplicable, isUnknown, valueAt } from "./values.js";

/** The cell of a CIF, with what the file says about its precision. */
export interface CifCell {
  readonly cell: Cell;
  /** Standard uncertainties in Å and degrees, null where none is given. */
  readonly uncertainties: { readonly [name in keyof Cell]: number | null };
  /** As written, `10.214(3)`. */
  readonly written: { readonly [name in keyof Cell]: string };
  /** Place value of the last digit written. */
  readonly lastDigits: { readonly [name in keyof Cell]: number };
  readonly place: Partial<Place>;
  readonly assumed: readonly Assumption[];
}

const names: { readonly [name in keyof Cell]: string } = {
  a: "_cell_length_a",
  b: "_cell_length_b",
  c: "_cell_length_c",
  alpha: "_cell_angle_alpha",
  beta: "_cell_angle_beta",
  gamma: "_cell_angle_gamma",
};

export const cellParameters = Object.keys(names) as readonly (keyof Cell)[];

interface Parameter {
  readonly number: CifNumber;
  readonly written: string;
  readonly place: Partial<Place>;
  readonly byDefault: boolean;
}

/** The core dictionary's default of an angle that is not given. */
const defaultAngle: CifNumber = { value: 90, uncertainty: null, lastDigit: 1 };

/**
 * Reads the unit cell; an angle that the file leaves out is 90°, the default of the core dictionary, and that is said.
 *
 * @throws `cif-missing`, `cif-value`, `invalid-cell`, all problems at once with their places
 */
export function readCell(reader: BlockReader): CifCell {
  const problems: Problem[] = [];
  const found = cellParameters.map((name) => readParameter(reader, name, problems));
  if (problems.length > 0) throw new KvaneError(problems);
  const parameters = found as readonly Parameter[];
  const record = <T>(of: (one: Parameter) => T) =>
    Object.fromEntries(cellParameters.map((name, index) => [name, of(parameters[index] as Parameter)])) as {
      [name in keyof Cell]: T;
    };
  const cell = record(({ number }) => number.value);
  checkAt(cell, parameters);
  const missing = cellParameters.filter((_, index) => parameters[index]?.byDefault);
  return {
    cell,
    uncertainties: record(({ number }) => number.uncertainty),
    written: record(({ written }) => written),
    lastDigits: record(({ number }) => number.lastDigit),
    place: parameters[0]?.place ?? blockPlace(reader),
    assumed:
      missing.length === 0
        ? []
        : [
            {
              what: `cell angle ${missing.join(", ")}`,
              value: "90 degrees",
              because: "the CIF does not give it, and that is the default of the CIF dictionary",
            },
          ],
  };
}

function readParameter(reader: BlockReader, name: keyof Cell, problems: Problem[]): Parameter | null {
  const { document } = reader;
  const dataName = names[name];
  const location = locate(reader, dataName);
  const value = location && valueAt(document, location.value);
  if (location === null || value === null || isUnknown(value) || isInapplicable(value)) {
    const place = location ? placeIn(document, location.start) : blockPlace(reader);
    if (name.length > 1 && (value === null || isInapplicable(value)))
      return { number: defaultAngle, written: "90", place, byDefault: true };
    problems.push(
      problem("cif-missing", `the cell is incomplete: ${dataName} is ${value ? "not known" : "missing"}`, {
        where: place,
        expected: `${dataName} with a number`,
        found: value ? value.raw : "no such name in the block",
        remedy: "add it to the CIF, or give the cell beside it: --cell, `cell:` in the study",
      }),
    );
    return null;
  }
  const number = numberOf(value);
  const place = placeIn(document, location.value);
  if (number && isMeasurable(number.value)) return { number, written: value.raw, place, byDefault: false };
  problems.push(
    number
      ? problem("cif-value", `${dataName} is a number that nobody measures`, {
          where: place,
          expected: measurableText,
          found: value.raw.slice(0, 60),
          remedy: "correct the number",
        })
      : notANumber(dataName, value, place),
  );
  return null;
}

/** The problem of a value that should be a number, with the likeliest reason. */
export function notANumber(dataName: string, value: CifValue, where: Partial<Place>): Problem {
  const text = value.shape === "text" ? value.text : value.raw;
  const remedy =
    value.shape === "text" && value.form !== "bare"
      ? "take the quotation marks away"
      : /\d,\d/.test(text)
        ? `write a decimal point: ${text.replace(",", ".")}`
        : /^-?\d+\/\d+$/.test(text)
          ? "write the fraction as a decimal; CIF has no fractions"
          : "correct the number";
  return problem("cif-value", `${dataName} ${whyNoNumber(text)}`, {
    where,
    expected: "a number such as 0.25 or 5.4310(2)",
    found: value.raw.slice(0, 60),
    remedy,
  });
}

function checkAt(cell: Cell, parameters: readonly Parameter[]): void {
  try {
    checkCell(cell);
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    throw new KvaneError(
      error.problems.map((one) => {
        const index = cellParameters.indexOf(one.where.path as keyof Cell);
        return { ...one, where: { ...one.where, ...parameters[Math.max(0, index)]?.place, path: null } };
      }),
    );
  }
}

/** For a block that has no cell at all. */
export function hasCell(reader: BlockReader): boolean {
  return cellParameters.some((name) => locate(reader, names[name]) !== null);
}

export function refuseCell(reader: BlockReader): never {
  return fail("cif-missing", `the data block ${reader.block.code} has no unit cell`, {
    where: blockPlace(reader),
    expected: "_cell_length_a and the other five parameters",
    found: "none of them",
    remedy: "choose another block with --block, or give the cell beside the CIF",
  });
}
