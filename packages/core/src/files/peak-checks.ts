import type { ProblemCode } from "../errors/index.js";
import type { PeakKind } from "../search/index.js";
import { largestQ, type PowderKind, positionToQ } from "./peak-conversion.js";
import type { ColumnRole } from "./peak-header.js";
import { kindUnits } from "./peak-units.js";
import type { PeakCells, PeakValue } from "./peak-values.js";
import { note, type ProblemList } from "./problem-list.js";
import type { Row } from "./table-rows.js";

/** Notes everything in a row that no peak can have; true when there is nothing. */
export function checkCells(
  row: Row,
  cells: PeakCells,
  kind: PeakKind,
  wavelengthAngstrom: number | null,
  problems: ProblemList,
): boolean {
  const before = problems.listed.length + problems.more;
  const { position, uncertainty, h, intensity } = cells;
  const wrong =
    kind === "hkl" ? wrongIndices(cells) : position && wrongPosition(kind, position.value, wavelengthAngstrom);
  const at = position ?? h;
  if (wrong && at) noteWrong(row, at, "peak-out-of-range", wrong, problems);
  const brackets = bracketsOf(cells);
  const given = uncertainty?.value ?? brackets?.uncertainty ?? null;
  if (uncertainty && brackets) noteTwice(row, uncertainty, "uncertainty", problems);
  else if (given !== null && !wrong) {
    const limit = kind === "hkl" ? 1 : (position?.value ?? Number.POSITIVE_INFINITY);
    checkUncertainty(row, uncertainty ?? brackets, given, limit, problems);
  }
  checkPolarization(row, cells.polarization, kind, problems);
  const ofIntensity = cells["intensity uncertainty"];
  const inBrackets = intensity?.uncertainty ?? null;
  if (ofIntensity && inBrackets !== null) noteTwice(row, ofIntensity, "intensity uncertainty", problems);
  else checkUncertainty(row, ofIntensity ?? intensity, ofIntensity?.value ?? inBrackets, null, problems);
  return problems.listed.length + problems.more === before;
}

/** The position or index with the largest uncertainty in brackets, if any has one. */
export function bracketsOf({ position, h, k, l }: PeakCells): PeakValue | undefined {
  let largest: PeakValue | undefined;
  for (const one of [position, h, k, l]) {
    if (one && one.uncertainty !== null && one.uncertainty > (largest?.uncertainty ?? -1)) largest = one;
  }
  return largest;
}

function noteWrong(row: Row, value: PeakValue, code: ProblemCode, wrong: Wrong, problems: ProblemList): void {
  note(problems, code, wrong.message, {
    where: { line: row.line, column: value.field.column },
    expected: wrong.expected,
    found: value.field.text,
    remedy: wrong.remedy,
  });
}

interface Wrong {
  readonly message: string;
  readonly expected: string;
  readonly remedy: string;
}

function wrongIndices({ h, k, l }: PeakCells): Wrong | null {
  if (h?.value !== 0 || k?.value !== 0 || l?.value !== 0) return null;
  return {
    message: "h k l = 0 0 0 is the direct beam, not a peak",
    expected: "at least one index other than 0",
    remedy: "remove the row",
  };
}

/** Å⁻¹. Far beyond every diffractometer on both sides; what lies outside is a slip of units or of the pen. */
const [leastQ, mostQ] = [1e-6, 1e4];

function wrongPosition(kind: PowderKind, position: number, wavelengthAngstrom: number | null): Wrong | null {
  const unit = kindUnits[kind];
  const limit = kind === "two-theta" ? 180 : Number.POSITIVE_INFINITY;
  if (!(position > 0 && position < limit)) {
    return {
      message: `a peak cannot be at ${kind} = ${position}${unit}`,
      expected: kind === "two-theta" ? "2theta above 0 and below 180 degrees" : `a ${kind} above 0`,
      remedy: "correct the position, or say another kind",
    };
  }
  const q = positionToQ(kind, position, wavelengthAngstrom);
  if (q < leastQ || q > mostQ)
    return {
      message: `no diffractometer measures a peak at ${kind} = ${position}${unit}`,
      expected: `a position with Q = 2π/d from ${leastQ} to ${mostQ} Å⁻¹`,
      remedy: "correct the position, its unit or the wavelength",
    };
  if (wavelengthAngstrom === null || kind === "two-theta") return null;
  if (q <= largestQ(wavelengthAngstrom)) return null;
  return {
    message: `a wavelength of ${wavelengthAngstrom} Å does not reach ${kind} = ${position}${unit}`,
    expected: `Q up to 4π/λ = ${largestQ(wavelengthAngstrom).toFixed(4)} Å⁻¹, d from λ/2 = ${wavelengthAngstrom / 2} Å`,
    remedy: "correct the wavelength, or the kind of the positions",
  };
}

/** @param limit what no uncertainty reaches; null for none */
function checkUncertainty(
  row: Row,
  value: PeakValue | undefined,
  uncertainty: number | null,
  limit: number | null,
  problems: ProblemList,
): void {
  if (!value || uncertainty === null) return;
  if (!(uncertainty > 0)) {
    const wrong = {
      message: `an uncertainty of ${uncertainty} cannot be`,
      expected: "a standard uncertainty above 0",
      remedy: "leave it out where it is not known",
    };
    noteWrong(row, value, "invalid-peak", wrong, problems);
  } else if (limit !== null && uncertainty >= limit) {
    const wrong = {
      message: "the uncertainty is as large as the position itself",
      expected: "a standard uncertainty far below the position",
      remedy: "if the column is an intensity, write a header that names the columns, such as: d intensity",
    };
    noteWrong(row, value, "invalid-peak", wrong, problems);
  }
}

/** A powder has no chiral term: it is odd in Q, and Q and −Q are one line. */
function checkPolarization(row: Row, value: PeakValue | undefined, kind: PeakKind, problems: ProblemList): void {
  if (!value) return;
  const possible = Math.abs(value.value) <= 1;
  if (possible && kind === "hkl") return;
  const wrong = possible
    ? {
        message: "the polarization of the beam counts only for reflections h k l",
        expected: "columns h k l beside the polarization",
        remedy: "remove the column: the intensities of a powder do not depend on it",
      }
    : {
        message: `the component of a polarization cannot be ${value.value}`,
        expected: "a number from -1 to 1, along Q = k_i - k_f",
        remedy: "correct the value; 0 or nothing is a beam that is not polarized",
      };
  noteWrong(row, value, "invalid-peak", wrong, problems);
}

function noteTwice(row: Row, value: PeakValue, role: ColumnRole, problems: ProblemList): void {
  const wrong = {
    message: `the ${role} is given twice, in brackets and in a column`,
    expected: "one of the two",
    remedy: "remove the brackets or the column",
  };
  noteWrong(row, value, "invalid-peak", wrong, problems);
}
