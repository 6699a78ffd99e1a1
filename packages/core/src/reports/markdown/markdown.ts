import type { Block, DocumentFigure, DocumentSection, ReportDocument } from "../document/blocks.js";
import { plainBlanks } from "../text/layout.js";

/** Whether the drawings lie beside the file, so that it can show them. */
export interface MarkdownOptions {
  readonly figures: "beside" | "none";
}

/**
 * A document as Markdown: CommonMark with pipe tables. Texts are escaped, so that a title with `*` or `<` stays as it
 * is. The same document gives the same bytes.
 */
export function markdownText(document: ReportDocument, options: MarkdownOptions): string {
  const lines = [
    `# ${escaped(document.title)}`,
    ...blocksLines(document.summary, options),
    ...document.sections.flatMap((section) => sectionLines(section, 2, options)),
    `Made by kvane ${escaped(document.version)}.`,
  ];
  return plainBlanks(`${lines.join("\n\n")}\n`);
}

function sectionLines(section: DocumentSection, level: number, options: MarkdownOptions): string[] {
  return [
    `${"#".repeat(Math.min(level, 6))} ${escaped(section.title)}`,
    ...blocksLines(section.blocks, options),
    ...section.parts.flatMap((part) => sectionLines(part, level + 1, options)),
  ];
}

function blocksLines(blocks: readonly Block[], options: MarkdownOptions): string[] {
  return blocks.flatMap((block) => blockLines(block, options));
}

function blockLines(block: Block, options: MarkdownOptions): string[] {
  switch (block.kind) {
    case "paragraph":
      return [escaped(block.text)];
    case "note":
      return [block.tone === "warning" ? `> **Note:** ${escaped(block.text)}` : `**${escaped(block.text)}**`];
    case "fields":
      return [block.entries.map(([name, value]) => `- ${escaped(name)}: ${escaped(value)}`).join("\n")];
    case "list":
      return [block.items.map((item, index) => `${block.ordered ? `${index + 1}.` : "-"} ${escaped(item)}`).join("\n")];
    case "table":
      return tableLines(block);
    case "figure":
      return figureLines(block.figure, options);
    case "live":
      return [];
    case "verbatim":
      return [verbatim(block.text)];
    case "more":
      return [`**${escaped(block.title)}**`, ...blocksLines(block.blocks, options)];
  }
}

function tableLines({ caption, columns, rows }: Extract<Block, { kind: "table" }>): string[] {
  const line = (cells: readonly string[]) => `| ${cells.map(escaped).join(" | ")} |`;
  const rule = `| ${columns.map(({ align }) => (align === "right" ? "--:" : ":--")).join(" | ")} |`;
  const body = rows.map((row) => line(columns.map((_, index) => row[index] ?? "")));
  return [`${escaped(caption)}:`, [line(columns.map(({ title }) => title)), rule, ...body].join("\n")];
}

function figureLines({ caption, parts, file }: DocumentFigure, { figures }: MarkdownOptions): string[] {
  if (figures === "none") return [];
  return [`![${escaped(parts[0]?.title ?? "")}](${file})`, escaped(caption)];
}

/** A block that no run of backticks in the text can end. */
function verbatim(text: string): string {
  const longest = Math.max(2, ...[...text.matchAll(/`+/g)].map(([run]) => run.length));
  const fence = "`".repeat(longest + 1);
  return `${fence}\n${text}\n${fence}`;
}

/** Every character that could begin mark-up of CommonMark or HTML, or end a cell, is escaped; line ends become blanks. */
function escaped(text: string): string {
  return text
    .replace(/\s*[\r\n]+\s*/g, " ")
    .replace(/[\\`*_[\]<>|~]/g, "\\$&")
    .replace(/&(?=[#\w]+;)/g, "\\&")
    .replace(/^(#{1,6}\s|[+-]\s|=+$|-{2,})/, "\\$1")
    .replace(/^(\d+)([.)]\s)/, "$1\\$2");
}
