import { note, type ProblemList, problemList, throwProblems } from "./problem-list.js";
import { readableText } from "./readable-text.js";
import { type Field, type Row, readRows } from "./table-rows.js";

/** `[re, im]`. */
type Complex = readonly [number, number];

/**
 * Reads a list of Fourier components: a row for each atom with its number (from 1, as tables of `kvane modes` count) and
 * three complex numbers such as `0.5`, `-0.3i`, `0.5+0.1i`. Separators and comments are those of peak lists. Atoms that
 * are not named have none.
 *
 * Throws `file-empty`, `file-unreadable`, and `invalid-component` with line and column, all problems at once.
 *
 * @param options.atoms how many atoms the site has
 * @returns the components of every atom
 */
export function parseFourierComponents(
  text: string,
  options: { readonly file: string; readonly atoms: number },
): readonly (readonly [Complex, Complex, Complex])[] {
  const problems = problemList(options.file);
  const found = new Map<number, readonly [Complex, Complex, Complex]>();
  for (const row of readRows(readableText(text, options.file))) readRow(row, options.atoms, found, problems);
  throwProblems(problems);
  return Array.from({ length: options.atoms }, (_, atom) => found.get(atom) ?? nothing);
}

const nothing: readonly [Complex, Complex, Complex] = [
  [0, 0],
  [0, 0],
  [0, 0],
];

function readRow(
  { line, fields }: Row,
  atoms: number,
  found: Map<number, readonly [Complex, Complex, Complex]>,
  problems: ProblemList,
): void {
  const [name, ...entries] = fields as [Field, ...Field[]];
  const refuse = (field: Field, message: string, expected: string): void =>
    note(problems, "invalid-component", message, {
      where: { line, column: field.column },
      expected,
      found: field.text === "" ? "nothing" : field.text,
      remedy: "write a row as `1  0.5+0.1i  0  -0.3`: the number of an atom and three complex numbers",
    });
  const atom = /^\d+$/.test(name.text) ? Number(name.text) - 1 : -1;
  if (atom < 0 || atom >= atoms) refuse(name, "the row names no atom of the site", `a number from 1 to ${atoms}`);
  else if (found.has(atom)) refuse(name, `atom ${atom + 1} has a row already`, "each atom once");
  if (entries.length !== 3) refuse(entries[3] ?? name, `the row has ${entries.length} components`, "three components");
  const values = entries.map((field) => {
    const value = readComplex(field.text);
    if (value === null) refuse(field, "the component is no complex number", "a number such as 0.5, -0.3i or 0.5+0.1i");
    return value;
  });
  const [x, y, z] = values;
  if (x && y && z) found.set(atom, [x, y, z]);
}

const size = "(?:\\d+(?:\\.\\d*)?|\\.\\d+)(?:e[+-]?\\d+)?";
const realPart = new RegExp(`^[+-]?${size}$`, "i");
const imaginaryPart = new RegExp(`^([+-]?)(${size})?\\*?i$`, "i");
const bothParts = new RegExp(`^([+-]?${size})([+-](?:${size})?\\*?i)$`, "i");

/** `0.5`, `i`, `-0.3i`, `0.5+0.1i`, `1e-3-2e-2i`; null for everything else. */
function readComplex(text: string): Complex | null {
  const written = text.replaceAll("\u2212", "-");
  const both = bothParts.exec(written);
  const real = both?.[1] ?? (realPart.test(written) ? written : "0");
  const imaginary = both?.[2] ?? (realPart.test(written) ? null : written);
  if (imaginary === null) return finite(Number(real), 0);
  const part = imaginaryPart.exec(imaginary);
  return part && finite(Number(real), Number(`${part[1]}${part[2] ?? 1}`));
}

function finite(re: number, im: number): Complex | null {
  return Number.isFinite(re) && Number.isFinite(im) ? [re, im] : null;
}
