import { median } from "./paired.js";
import type { Measured, Row } from "./part.js";

const heads = ["what", "over", "ratio", "least", "most"] as const;

/** The one table of the bench, with what stands below it. */
export function tableText(parts: readonly Measured[]): string {
  const rows = parts.flatMap((part) => part.rows);
  const cells = [[...heads], ...rows.map(cellsOf)];
  const widths = heads.map((_head, column) => Math.max(...cells.map((row) => (row[column] as string).length)));
  const lines = cells.map((row) =>
    row
      .map((cell, column) =>
        column < 2 ? cell.padEnd(widths[column] as number) : cell.padStart(widths[column] as number),
      )
      .join("  ")
      .trimEnd(),
  );
  const notes = [...markNotes(rows), ...parts.flatMap((part) => part.notes)];
  return `${lines.join("\n")}\n${notes.length > 0 ? "\n" : ""}${notes.map((note) => `- ${note}\n`).join("")}`;
}

function cellsOf(row: Row): string[] {
  const what = row.what + (isAbove(row) ? " *" : "");
  const figures = [median(row.ratios), Math.min(...row.ratios), Math.max(...row.ratios)];
  return [what, row.over, ...figures.map(figure)];
}

/** Three digits, as few decimals as they need. */
function figure(value: number): string {
  const decimals = value >= 99.5 ? 0 : value >= 9.95 ? 1 : value >= 0.0995 ? 2 : 3;
  return value.toFixed(decimals);
}

function isAbove({ ratios, bound }: Row): boolean {
  return bound !== undefined && median(ratios) > bound;
}

function markNotes(rows: readonly Row[]): string[] {
  const bounds = [...new Set(rows.filter(isAbove).map(({ bound }) => bound))];
  return bounds.map((bound) => `* above ${bound}, which it should keep below`);
}
