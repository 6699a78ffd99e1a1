import { type Attributes, element, escapeMarkup } from "./mark-up.js";
import { paint } from "./palette.js";

/** A drawing: its size in its own units, what it shows in words, and its marks. */
export interface Figure {
  readonly width: number;
  readonly height: number;
  /** Short name, for readers that do not see it. */
  readonly title: string;
  /** What it shows, in a sentence or two. */
  readonly description: string;
  readonly marks: string;
}

/** Letters of all drawings. */
const letters: Attributes = { "font-family": "system-ui, 'Segoe UI', 'DejaVu Sans', sans-serif", "font-size": 12 };

/** The `svg` element for a page; `id` makes the references of title and description unique. */
export function inlineSvg(figure: Figure, id: string, extra: Attributes = {}): string {
  return element(
    "svg",
    {
      ...frame(figure),
      role: "img",
      "aria-labelledby": `${id}-title ${id}-text`,
      ...extra,
    },
    element("title", { id: `${id}-title` }, escapeMarkup(figure.title)),
    element("desc", { id: `${id}-text` }, escapeMarkup(figure.description)),
    figure.marks,
  );
}

/** A file of its own, on white paper. */
export function standaloneSvg(figure: Figure): string {
  const paper = element("rect", { width: figure.width, height: figure.height, ...paint({ fill: "paper" }) });
  const drawing = element(
    "svg",
    { xmlns: "http://www.w3.org/2000/svg", ...frame(figure), width: figure.width, height: figure.height },
    element("title", {}, escapeMarkup(figure.title)),
    element("desc", {}, escapeMarkup(figure.description)),
    paper,
    figure.marks,
  );
  return `<?xml version="1.0" encoding="UTF-8"?>\n${drawing}\n`;
}

function frame({ width, height }: Figure): Attributes {
  return { viewBox: `0 0 ${Math.round(width)} ${Math.round(height)}`, ...letters };
}

/** Drawings side by side, as one. */
export function besideEachOther(figures: readonly Figure[], title: string, description: string): Figure {
  let x = 0;
  const placed = figures.map((figure) => {
    const group = element("g", { transform: `translate(${Math.round(x)} 0)` }, figure.marks);
    x += figure.width;
    return group;
  });
  return {
    width: x,
    height: Math.max(...figures.map(({ height }) => height)),
    title,
    description,
    marks: placed.join(""),
  };
}

/** About how wide a text is in these letters; enough to keep labels apart. */
export function textWidth(text: string, size = 12): number {
  return [...text].length * size * 0.56;
}
