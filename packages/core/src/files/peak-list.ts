import { fail } from "../errors/index.js";
import type { Peak, PeakKind, PeakList } from "../search/index.js";
import { checkCells } from "./peak-checks.js";
import { type Column, type Header, isHeader, readHeader } from "./peak-header.js";
import { peakKindWords } from "./peak-kind.js";
import { givenUncertainty, toPeak, uncertaintySource } from "./peak-record.js";
import { unitFactor, unitNames } from "./peak-units.js";
import { isPosition, noteDecimalComma, readCells } from "./peak-values.js";
import { note, type ProblemList, problemList, throwProblems } from "./problem-list.js";
import { readableText } from "./readable-text.js";
import { looksLikeDecimalCommas, type Row, readRows } from "./table-rows.js";

/** How a list of peaks is to be read; what is left out the header of the list must say. */
export interface PeakListOptions {
  /** Name of the file, for messages. */
  readonly file: string;
  /** What the positions are; without it the header must say so. */
  readonly kind?: PeakKind;
  /** Å. Needed for 2θ; with other kinds positions beyond 4π/λ are refused. */
  readonly wavelengthAngstrom?: number;
  /**
   * Half-width of a match in the positions' own unit, taken as 3 standard uncertainties of every peak; those of the
   * file do not serve then.
   */
  readonly tolerance?: number;
  /** Unit of the positions, `nm` or `rad` for example, where the header names none; default Å, Å⁻¹, degrees, r.l.u. */
  readonly unit?: string;
}

/**
 * Reads a list of peaks: one a row, columns position, standard uncertainty, intensity and its standard uncertainty (all
 * but the position may be missing), or three columns h k l; a header may name the columns in any order. The manual page
 * on peak lists has the whole format.
 *
 * Positions become Q in Å⁻¹ with a standard uncertainty in Å⁻¹, fractional indices stay what they are.
 *
 * Throws all problems of the file at once, each with line and column: `file-empty`, `file-unreadable`,
 * `peak-kind-unknown`, `conflicting-arguments` (header against option), `missing-wavelength`, `invalid-number` (an
 * option), `file-too-large`, `invalid-peak`, `peak-out-of-range`.
 */
export function parsePeakList(text: string, options: PeakListOptions): PeakList {
  return readPeakTable(text, options).list;
}

/** A list of peaks with what only intensities have a use for. */
export interface PeakTable {
  readonly list: PeakList;
  /** One per peak: component along Q of the polarization of the incident beam; null where the row has none. */
  readonly polarizations: readonly (number | null)[];
}

/** Rows: more than any experiment has satellites, and so few that every step with them ends. */
const mostPeaks = 100_000;

/** As `parsePeakList`. */
export function readPeakTable(text: string, options: PeakListOptions): PeakTable {
  const { file } = options;
  const rows = readRows(readableText(text, file));
  const problems = problemList(file);
  checkOptions(options, problems);
  const [first] = rows;
  const headed = first !== undefined && isHeader(first);
  const header = headed ? readHeader(first, options.kind ?? null, problems) : null;
  const data = headed ? rows.slice(1) : rows;
  if (data.length > mostPeaks)
    fail("file-too-large", `the list has ${data.length} rows`, {
      where: { file, line: data[mostPeaks]?.line ?? 1, column: 1 },
      expected: `a list of at most ${mostPeaks} peaks`,
      found: `${data.length} rows`,
      remedy: "check that this is a list of peaks, not the measured points",
    });
  if (data.length === 0) noteNoPeaks(first, problems);
  const kind = decideKind(options, first, headed, header, problems);
  const columns = header?.columns ?? defaultColumns(kind, headed ? data : []);
  const commas = !headed && kind !== "hkl" && looksLikeDecimalCommas(data);
  if (commas) {
    for (const row of data)
      noteDecimalComma(row, { text: row.text.trim(), column: row.fields[0]?.column ?? 1 }, problems);
  }
  const wavelength = usable(options.wavelengthAngstrom) ? options.wavelengthAngstrom : null;
  // A unit named with the position holds for its uncertainty too.
  const optionFactor = kind && options.unit !== undefined ? unitFactor(kind, options.unit) : null;
  const factor = columns.find(({ role }) => isPosition(role))?.factor ?? optionFactor ?? 1;
  const converted = columns.map((column) => ({ ...column, factor: isMeasure(column) ? (column.factor ?? factor) : 1 }));
  const tolerance = options.tolerance === undefined ? null : options.tolerance * factor;
  const scale = kind && { kind, wavelengthAngstrom: wavelength, tolerance };
  const peaks: Peak[] = [];
  const polarizations: (number | null)[] = [];
  let given = 0;
  let farthest = kind === "hkl" ? 1 : 0;
  for (const row of commas ? [] : data) {
    const cells = readCells(row, converted, headed, problems);
    if (!cells || !scale || !checkCells(row, cells, scale.kind, wavelength, problems)) continue;
    if (givenUncertainty(cells) !== null) given += 1;
    farthest = Math.max(farthest, cells.position?.value ?? 0);
    peaks.push(toPeak(cells, peaks.length, row.line, scale));
    polarizations.push(cells.polarization?.value ?? null);
  }
  if (tolerance !== null && peaks.length > 0 && tolerance >= farthest) noteTolerance(options.tolerance, problems);
  throwProblems(problems);
  if (!scale) fail("internal-fault", "a peak list without a kind was not refused", { where: { file } });
  const source = uncertaintySource(given, peaks.length, scale);
  const list = { kind: scale.kind, wavelengthAngstrom: wavelength, peaks, uncertaintySource: source };
  return { list, polarizations };
}

function isMeasure({ role }: Column): boolean {
  return role !== "intensity" && role !== "intensity uncertainty" && role !== "polarization";
}

function usable(value: number | undefined): value is number {
  return value !== undefined && value > 0 && Number.isFinite(value);
}

function checkOptions(options: PeakListOptions, problems: ProblemList): void {
  for (const [name, value] of [
    ["wavelength", options.wavelengthAngstrom],
    ["tolerance", options.tolerance],
  ] as const) {
    if (value === undefined || usable(value)) continue;
    note(problems, "invalid-number", `the ${name} cannot be ${value}`, {
      where: { argument: `--${name}` },
      expected: "a number above 0",
      found: String(value),
      remedy: `give the ${name} as a number above 0`,
    });
  }
}

/** A half-width beyond every position, or above 1 in h, k, l, matches everything with everything. */
function noteTolerance(tolerance: number | undefined, problems: ProblemList): void {
  note(problems, "invalid-number", "the tolerance is as large as the positions themselves", {
    where: { argument: "--tolerance" },
    expected: "the half-width of a match, far below the positions, in their unit",
    found: String(tolerance),
    remedy: "give a smaller tolerance, or none: the list's own uncertainties then serve",
  });
}

function noteNoPeaks(first: Row | undefined, problems: ProblemList): void {
  note(problems, "file-empty", "the list has no peaks", {
    where: { line: first?.line ?? 1, column: 1 },
    expected: "at least one row with a position",
    found: first ? "a header alone" : "nothing but comments and blank lines",
    remedy: "check the name of the file and how it was written",
  });
}

/** The kind from the option, else from the header; never from the numbers. Null when a problem was noted. */
function decideKind(
  options: PeakListOptions,
  first: Row | undefined,
  headed: boolean,
  header: Header | null,
  problems: ProblemList,
): PeakKind | null {
  const where = { line: header?.line ?? first?.line ?? 1, column: header?.column ?? first?.fields[0]?.column ?? 1 };
  const indexed = header ? header.columns.some(({ role }) => role === "h") : null;
  const clash = header?.kind ? header.kind !== options.kind : indexed !== null && indexed !== (options.kind === "hkl");
  if (options.kind && clash) {
    note(problems, "conflicting-arguments", `the header does not name ${options.kind} as the positions`, {
      where,
      expected: `${options.kind}, as asked for`,
      found: header?.kind ?? "position",
      remedy: "correct the header, or leave the kind out",
    });
    return null;
  }
  const kind = options.kind ?? header?.kind ?? null;
  if (!kind) {
    // A header that could not be read is a problem of its own, and may have been meant to say the kind.
    if (first && !(headed && !header)) {
      note(problems, "peak-kind-unknown", "it is not said what the positions are", {
        where,
        expected: peakKindWords,
        found: headed ? "a header that does not say it" : "no header",
        remedy: "say the kind (--as, or `as:` in the study), or write a header such as: d su",
      });
    }
    return null;
  }
  if (kind === "two-theta" && options.wavelengthAngstrom === undefined) {
    note(problems, "missing-wavelength", "2theta positions need the wavelength", {
      where,
      expected: "the wavelength in Å",
      found: "none",
      remedy: "give it (--wavelength, or `wavelength:` in the study)",
    });
  }
  if (options.unit !== undefined && unitFactor(kind, options.unit) === null) {
    note(problems, "invalid-argument", `\`${options.unit}\` is no unit for ${kind}`, {
      where,
      expected: unitNames(kind),
      found: options.unit,
      remedy: "correct the unit, or leave it out",
    });
  }
  return kind;
}

const powderColumns = ["position", "uncertainty", "intensity", "intensity uncertainty"] as const;

/** Columns of a list without a header; where the header could not be read, only numbers are looked for. */
function defaultColumns(kind: PeakKind | null, unreadable: readonly Row[]): Column[] {
  if (kind === "hkl") return (["h", "k", "l"] as const).map((role) => ({ role, factor: null }));
  const widest = Math.max(powderColumns.length, ...unreadable.slice(0, 1).map((row) => row.fields.length));
  return Array.from({ length: widest }, (_, index) => ({ role: powderColumns[index] ?? "intensity", factor: null }));
}
