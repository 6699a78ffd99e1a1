import { isTooLarge, whyNoNumber } from "../errors/index.js";
import type { ScanSeries } from "../onsets/index.js";
import { isMeasurable, measurableText } from "./measurable.js";
import { readNumber } from "./number-text.js";
import { noteDecimalComma } from "./peak-values.js";
import { note, type ProblemList, problemList, throwProblems } from "./problem-list.js";
import { readableText } from "./readable-text.js";
import { holdsValues, type ScanColumn, type ScanRole, scanColumns } from "./scan-header.js";
import { decimalCommaOf, type Field, type Row, readRows } from "./table-rows.js";

/** A temperature scan: several quantities against temperature. */
export interface ScanTable {
  readonly file: string;
  /** All columns, in the order of the file. */
  readonly columns: readonly ScanColumn[];
  readonly intensities: readonly ScanSeries[];
  /** Components of the wave vector, columns called k, kx, ky, kz, u, v or w. */
  readonly k: readonly ScanSeries[];
  /** Whether a header named the columns; without one every column is an intensity. */
  readonly headed: boolean;
  readonly rows: number;
}

/** Values of a scan (rows × columns besides T and s.u.) beyond which the fits take half a minute. */
const mostValues = 10000;
/** Columns of a table that is a scan; in a line of more a name is looked for among all the others. */
const mostColumns = 1000;
/** What stands in a cell that has no value. */
const missing = /^([-–—.]|nan)?$/i;

/**
 * Reads a temperature scan: rows of a temperature in K and one or more quantities. A header names the columns: T first,
 * then a name for each peak; columns of uncertainties are told by their names (`scanColumns`), and columns called k, kx,
 * ky, kz, u, v, w are components of the wave vector. Values may carry their uncertainty in brackets, `132(4)`. Empty cells,
 * `-` and `nan` are left out. Rows may stand in any order.
 *
 * Throws all problems at once with line and column: `file-empty`, `file-unreadable`, `invalid-scan`.
 */
export function parseScanTable(text: string, file: string): ScanTable {
  const problems = problemList(file);
  const rows = readRows(readableText(text, file));
  const [first] = rows;
  if (!first) {
    note(problems, "file-empty", "the scan holds nothing but comments", { where: { line: 1, column: 1 } });
    throwProblems(problems);
  }
  if (first && first.fields.length > mostColumns) {
    note(problems, "invalid-scan", `the first row has ${first.fields.length} columns`, {
      where: { line: first.line, column: 1 },
      expected: `at most ${mostColumns} columns`,
      found: `${first.fields.length}`,
      remedy: "check that this is the scan; a temperature has a row of its own",
    });
    throwProblems(problems);
  }
  const headed =
    first !== undefined &&
    readNumber(first.fields[0]?.text ?? "") === null &&
    !isTooLarge(first.fields[0]?.text ?? "") &&
    decimalCommaOf(first) === null;
  const data = headed ? rows.slice(1) : rows;
  const columns = headed ? scanColumns(first as Row, problems) : plainColumns(data);
  if (columns.filter(({ role }) => role === "intensity" || role === "k").length === 0)
    note(problems, "invalid-scan", "there is no column besides the temperature", {
      where: { line: first?.line ?? 1, column: 1 },
      expected: "T, then a column for each peak",
      found: first?.text.trim() ?? "nothing",
      remedy: "write a header such as T peak1 su peak2 su",
    });
  if (headed && data.length === 0)
    note(problems, "invalid-scan", "the scan has a header and no row of values", {
      where: { line: first?.line ?? 1, column: 1 },
      expected: "a row for each temperature",
      found: "the header alone",
      remedy: "add the measured rows below the header",
    });
  const values = data.length * columns.filter(holdsValues).length;
  if (values > mostValues)
    note(problems, "invalid-scan", `the scan has ${values} values, more than the ${mostValues} that are fitted`, {
      where: { line: first?.line ?? 1, column: 1 },
      expected: `rows times peaks up to ${mostValues}`,
      found: `${values}`,
      remedy: "average neighbouring temperatures, or give the peaks in several files",
    });
  throwProblems(problems);
  const cells = data.map((row) => readRow(row, columns, problems));
  throwProblems(problems);
  const series = (role: ScanRole) =>
    columns.flatMap((column, index) => (column.role === role ? [seriesOf(column.name, index, columns, cells)] : []));
  return { file, columns, intensities: series("intensity"), k: series("k"), headed, rows: data.length };
}

/** Uncertainties of the temperature take part in nothing. */
export function isUnused({ of }: Pick<ScanColumn, "of">, columns: readonly ScanColumn[]): boolean {
  return of !== null && columns[of]?.role === "temperature";
}

function plainColumns(rows: readonly Row[]): ScanColumn[] {
  const width = rows.reduce((most, { fields }) => Math.max(most, fields.length), 0);
  return Array.from({ length: width }, (_, index) => ({
    name: index === 0 ? "T" : `column ${index + 1}`,
    role: index === 0 ? "temperature" : "intensity",
    of: null,
    guessed: false,
  }));
}

interface Cell {
  readonly value: number;
  readonly uncertainty: number | null;
}

/** The numbers of a row by column; null where a cell is empty. */
function readRow(row: Row, columns: readonly ScanColumn[], problems: ProblemList): (Cell | null)[] {
  const comma = decimalCommaOf(row);
  if (comma) {
    noteDecimalComma(row, comma, problems);
    return [];
  }
  if (row.fields.length > columns.length) {
    const field = row.fields[columns.length] as Field;
    note(problems, "invalid-scan", `the row has ${row.fields.length} values where ${columns.length} are expected`, {
      where: { line: row.line, column: field.column },
      expected: columns.map(({ name }) => name).join(", "),
      found: field.text,
      remedy: "name every column in the header, and put notes behind #",
    });
  }
  if (row.fields.length < columns.length)
    note(problems, "invalid-scan", `the row has ${row.fields.length} values where ${columns.length} are expected`, {
      where: { line: row.line, column: row.fields.at(-1)?.column ?? 1 },
      expected: columns.map(({ name }) => name).join(", "),
      found: row.text.trim(),
      remedy: "write - for a value that is not there",
    });
  return columns.map(({ name, role, of }, index) => {
    const field = row.fields[index];
    const empty = field === undefined || missing.test(field.text);
    if (empty && role !== "temperature") return null;
    const number = field === undefined ? null : readNumber(field.text);
    const wrong =
      number === null ||
      (role === "temperature" && !(number.value > 0)) ||
      (role === "uncertainty" && !(number.value > 0) && !isUnused({ of }, columns));
    if (!wrong) {
      if (isMeasurable(number.value) && isMeasurable(number.uncertainty ?? 0)) return number;
      note(problems, "invalid-scan", `\`${field?.text ?? ""}\` is a number that nobody measures`, {
        where: { line: row.line, column: field?.column ?? 1 },
        expected: measurableText,
        found: field?.text ?? "nothing",
        remedy: "correct the value, or give the column in another unit",
      });
      return null;
    }
    const text = field?.text ?? "";
    const wanted = role === "uncertainty" || role === "temperature" ? role : `number for ${name}`;
    note(problems, "invalid-scan", `\`${text}\` ${whyNoNumber(text, `is no ${wanted}`)}`, {
      where: { line: row.line, column: field?.column ?? 1 },
      expected:
        role === "temperature"
          ? "a temperature in K, above 0"
          : role === "uncertainty"
            ? "a number above 0"
            : "a number such as 132.5 or 132(4)",
      found: field?.text ?? "nothing",
      remedy: "correct the value; what is no data goes behind #, and - stands for a value that is not there",
    });
    return null;
  });
}

function seriesOf(
  name: string,
  index: number,
  columns: readonly ScanColumn[],
  cells: readonly (readonly (Cell | null)[])[],
): ScanSeries {
  const temperature = columns.findIndex(({ role }) => role === "temperature");
  const su = columns.findIndex(({ of }) => of === index);
  const points = cells
    .flatMap((row) => {
      const [t, value] = [row[temperature], row[index]];
      if (!t || !value) return [];
      return [{ t: t.value, value: value.value, su: (su >= 0 ? row[su]?.value : null) ?? value.uncertainty }];
    })
    .sort((a, b) => a.t - b.t);
  const complete = points.length > 0 && points.every((point) => point.su !== null && point.su > 0);
  return {
    name,
    temperatures: points.map(({ t }) => t),
    values: points.map(({ value }) => value),
    uncertainties: complete ? points.map((point) => point.su as number) : null,
  };
}
