import { styleText } from "node:util";
import { caretLine, type Place, type Problem } from "@kvane/core/errors";

/** Gives the source line that a place is in, where it is known. */
export type SourceLines = (place: Place) => string | null;

/** All problems as text for the error output, one block each. */
export function problemsText(problems: readonly Problem[], kind: "error" | "warning", lines: SourceLines): string {
  return problems.map((one) => problemText(one, kind, lines)).join("\n");
}

function problemText(one: Problem, kind: "error" | "warning", lines: SourceLines): string {
  const place = placeText(one.where);
  const source = lines(one.where);
  const caret =
    source === null || source.trim() === "" || one.where.column === null ? null : caretLine(source, one.where.column);
  const details = [
    ["expected", one.expected],
    ["found", one.found],
    ["remedy", one.remedy],
  ] as const;
  const head = `${kind}[${one.code}]`;
  const colour = kind === "error" ? "red" : "yellow";
  const parts = [
    ...wrapped(`${kind}[${one.code}]: ${one.message}`, 2).map((line) => line.replace(head, styled(colour, head))),
    ...(place === "" ? [] : [`  at ${place}`]),
    ...(caret === null ? [] : caret.split("\n").map((line) => `    | ${line}`)),
    ...details.flatMap(([name, text]) => (text === null ? [] : wrapped(`  ${`${name}:`.padEnd(9)} ${text}`, 12))),
  ];
  return `${parts.join("\n")}\n`;
}

const widest = 100;

/** Lines of at most 100 characters, broken at blanks, later ones indented; words that are wider stay whole. */
function wrapped(text: string, indent: number): string[] {
  const lines: string[] = [];
  let line = "";
  for (const word of text.split(/(?<=\S) (?=\S)/)) {
    if (line === "") line = word;
    else if ([...line].length + 1 + [...word].length <= widest) line = `${line} ${word}`;
    else {
      lines.push(line);
      line = " ".repeat(indent) + word;
    }
  }
  return [...lines, line];
}

/** `peaks.csv:4:7`, `--k, column 5`, `study.yaml:3:1 (sites[1].at)`. */
function placeText({ file, line, column, path, argument }: Place): string {
  if (file !== null) {
    const position = [file === "-" ? "standard input" : file, line, column].filter((part) => part !== null).join(":");
    return path === null ? position : `${position} (${path})`;
  }
  if (argument === null) return "";
  return column === null ? argument : `${argument}, column ${column}`;
}

/** Colour where the error output is a terminal that wants it; NO_COLOR and FORCE_COLOR are obeyed. */
function styled(colour: "red" | "yellow", text: string): string {
  return styleText(colour, text, { stream: process.stderr, validateStream: true });
}
