import type { Envelope, InputRecord } from "../../records/common.js";
import { type DocumentSection, fieldsBlock, listBlock, moreBlock, paragraphBlock } from "../blocks.js";
import type { DocumentSource } from "../run-document.js";

/** What is needed to get the same report again. */
export function repeatSection({ answer, record, file }: DocumentSource): DocumentSection {
  return {
    id: "repeat",
    title: "How to repeat this",
    parts: [],
    blocks: [
      paragraphBlock("The same version, command, study and peak list give the same bytes."),
      { kind: "verbatim", text: commandLine(answer, file) },
      ...fieldsBlock([
        ["Version", `kvane ${answer.kvane}, format ${answer.format}`],
        ...inputEntries(answer.input),
        ...(record.peaks?.file ? [["Peak list", record.peaks.file] as const] : []),
      ]),
      ...moreBlock(
        `Files of the result folder (${record.files.length})`,
        listBlock(record.files, { short: true }),
      ).filter(() => record.files.length > 0),
    ],
  };
}

/** The command as it would be typed. */
function commandLine({ command, input }: Envelope, file: string | null): string {
  const { study = null, ...options } = input;
  const words = ["kvane", command];
  if (typeof study === "string") words.push(study === "example:/study.yaml" ? "--example" : quoted(study));
  for (const [name, value] of Object.entries(options)) {
    if (name === "files" || value === null || value === false) continue;
    for (const one of Array.isArray(value) ? value : [value])
      words.push(one === true ? optionName(name) : `${optionName(name)} ${quoted(String(one))}`);
  }
  if (options["files"] === true) words.push("--out results");
  if (command === "report" && file !== null) words.push(`--out ${quoted(nameOf(file))}`);
  return words.join(" ");
}

/** Without its folder: where somebody keeps files is nobody else's business, and would change the bytes. */
function nameOf(file: string): string {
  return file.replace(/^.*[\\/]/, "");
}

/** Fields of the request whose option is called otherwise. */
const otherNames: { readonly [field: string]: string } = { impurities: "impurity", sites: "site" };

function optionName(field: string): string {
  return `--${(otherNames[field] ?? field).replace(/[A-Z]/g, (letter) => `-${letter.toLowerCase()}`)}`;
}

function quoted(text: string): string {
  return /^[\w./:,=+-]+$/.test(text) ? text : `"${text.replace(/["\\$`]/g, "\\$&")}"`;
}

function inputEntries(input: InputRecord): [string, string][] {
  return Object.entries(input).flatMap(([name, value]): [string, string][] =>
    value === null || value === false || name === "files"
      ? []
      : [[name === "study" ? "Study" : optionName(name), Array.isArray(value) ? value.join("; ") : String(value)]],
  );
}
