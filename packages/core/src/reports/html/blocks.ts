import type { Block, DocumentFigure, DocumentSection } from "../document/blocks.js";
import { inlineSvg } from "../svg/figure.js";
import { element, escapeMarkup as text } from "../svg/mark-up.js";

/** A cell longer than this may be broken into lines. */
const longCell = 44;

/** One section with its parts; `level` is that of its heading. */
export function sectionHtml(section: DocumentSection, level: number): string {
  const heading = `h${Math.min(level, 6)}`;
  return element(
    "section",
    { id: section.id, "aria-labelledby": `${section.id}-head` },
    element(heading, { id: `${section.id}-head` }, text(section.title)),
    "\n",
    blocksHtml(section.blocks, section.id),
    ...section.parts.map((part) => sectionHtml(part, level + 1)),
  );
}

/** Blocks one after the other; ids inside begin with `prefix`. */
export function blocksHtml(blocks: readonly Block[], prefix: string): string {
  return blocks.map((block, index) => `${blockHtml(block, `${prefix}-${index + 1}`)}\n`).join("");
}

function blockHtml(block: Block, id: string): string {
  switch (block.kind) {
    case "paragraph":
      return element("p", {}, prose(block.text));
    case "note":
      return noteHtml(block);
    case "fields":
      return element(
        "dl",
        { class: "fields" },
        ...block.entries.map(([name, value]) => element("dt", {}, text(name)) + element("dd", {}, prose(value))),
      );
    case "list":
      return element(
        block.ordered ? "ol" : "ul",
        { class: block.short ? "short" : null },
        ...block.items.map((item) => element("li", {}, prose(item))),
      );
    case "table":
      return tableHtml(block, id);
    case "figure":
      return figureHtml(block.figure);
    case "live":
      return element(
        "div",
        {
          id: block.id,
          class: "live",
          role: "group",
          "aria-label": block.label,
          "data-live": block.view.kind,
          "data-data": block.view.data,
        },
        element(
          "p",
          { class: "hint" },
          text(
            `${block.label}: drawn when it comes into view, for which the page needs scripts; the drawings below show the same.`,
          ),
        ),
      );
    case "verbatim":
      return element("pre", { tabindex: "0" }, text(block.text));
    case "more":
      return element("details", {}, element("summary", {}, text(block.title)), "\n", blocksHtml(block.blocks, id));
  }
}

function noteHtml({ tone, text: words }: Extract<Block, { kind: "note" }>): string {
  const head = tone === "warning" ? element("b", {}, "Note: ") : "";
  return element("p", { class: tone === "good" ? "note good" : "note" }, head, prose(words));
}

function tableHtml({ caption, columns, rows }: Extract<Block, { kind: "table" }>, id: string): string {
  const long = columns.map((_, index) => rows.some((row) => [...(row[index] ?? "")].length > longCell));
  const classOf = (index: number) =>
    [columns[index]?.align === "right" ? "number" : "", long[index] ? "words" : ""].filter(Boolean).join(" ") || null;
  const head = columns.map(({ title }, index) =>
    element("th", { scope: "col", class: classOf(index) }, title === "" ? "№" : text(title)),
  );
  const body = rows.map((row) =>
    element(
      "tr",
      {},
      ...columns.map((_, index) =>
        index === 0
          ? element("th", { scope: "row", class: classOf(index) }, text(row[index] ?? ""))
          : element("td", { class: classOf(index) }, text(row[index] ?? "")),
      ),
    ),
  );
  return element(
    "div",
    { class: "table", role: "region", "aria-labelledby": `${id}-caption`, tabindex: "0" },
    element(
      "table",
      {},
      element("caption", { id: `${id}-caption` }, text(caption)),
      element("thead", {}, element("tr", {}, ...head)),
      element("tbody", {}, ...body),
    ),
  );
}

function figureHtml({ id, caption, parts, legend, live, scrolls }: DocumentFigure): string {
  const drawings = parts.map((part, index) =>
    live === null
      ? inlineSvg(part, `${id}-${index + 1}`, { width: part.width, height: part.height })
      : inlineSvg(part, id),
  );
  const kind = live?.kind === "peaks" ? "wide" : live?.kind === "zone" ? "zone" : scrolls ? "scrolls" : null;
  return element(
    "figure",
    { id, class: kind, "data-live": live?.kind ?? null, "data-data": live?.data ?? null },
    legend === null ? null : inlineSvg(legend, `${id}-legend`, { class: "legend-of" }),
    live === null
      ? element(
          "div",
          // What scrolls has to be reached by keyboard.
          scrolls
            ? { class: "parts", tabindex: "0", role: "group", "aria-label": parts[0]?.title ?? "" }
            : { class: "parts" },
          ...drawings,
        )
      : element(
          "div",
          { class: "stage", tabindex: "0", role: "group", "aria-label": parts[0]?.title ?? "" },
          ...drawings,
        ),
    element("figcaption", {}, text(caption)),
  );
}

/** Text in which a line does not break inside an option such as `--json`. */
function prose(words: string): string {
  return text(words).replace(/--[a-z][a-z-]*/g, '<span class="option">$&</span>');
}
