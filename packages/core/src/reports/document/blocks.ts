import type { Figure } from "../svg/figure.js";

/** A column of a table of a document. */
export interface DocumentColumn {
  readonly title: string;
  readonly align?: "left" | "right";
}

/** What a page does with a drawing beyond showing it: the name of the script's part and the key of its data. */
export interface LiveView {
  readonly kind: "peaks" | "zone" | "moments" | "configurations";
  /** Key in the data of the page. */
  readonly data: string;
}

/** A drawing in a document: drawn from its data when it is wanted, and the file that it has in a result folder. */
export interface DocumentFigure {
  readonly id: string;
  readonly caption: string;
  /** Parts that a page may set side by side or below each other. */
  readonly parts: readonly Figure[];
  /** What the colours mean, above them; null where there is nothing to say. */
  readonly legend: Figure | null;
  readonly file: string;
  readonly live: LiveView | null;
  /** Set where a narrow page lets the reader scroll it: smaller, its letters would not be read. */
  readonly scrolls?: true;
}

/**
 * A part of a document. All texts are plain: who writes the document escapes them. `more` is what a reader may fold
 * away.
 */
export type Block =
  | { readonly kind: "paragraph"; readonly text: string }
  | { readonly kind: "note"; readonly tone: "good" | "warning"; readonly text: string }
  | { readonly kind: "fields"; readonly entries: readonly (readonly [string, string])[] }
  | { readonly kind: "list"; readonly ordered: boolean; readonly short: boolean; readonly items: readonly string[] }
  | {
      readonly kind: "table";
      readonly caption: string;
      readonly columns: readonly DocumentColumn[];
      readonly rows: readonly (readonly string[])[];
    }
  | { readonly kind: "figure"; readonly figure: DocumentFigure }
  /** A view that only a page with a script can show, such as moments that can be turned. */
  | { readonly kind: "live"; readonly id: string; readonly label: string; readonly view: LiveView }
  | { readonly kind: "verbatim"; readonly text: string }
  | { readonly kind: "more"; readonly title: string; readonly blocks: readonly Block[] };

/** A headed part of a document; `id` is unique in it. */
export interface DocumentSection {
  readonly id: string;
  readonly title: string;
  readonly blocks: readonly Block[];
  readonly parts: readonly DocumentSection[];
}

/** A whole document, and the data from which a page draws its live views. */
export interface ReportDocument {
  readonly title: string;
  readonly summary: readonly Block[];
  readonly sections: readonly DocumentSection[];
  readonly data: { readonly [key: string]: unknown };
  readonly version: string;
}

export function paragraphBlock(text: string): Block {
  return { kind: "paragraph", text };
}

/** Names and values; nothing where there are none. */
export function fieldsBlock(entries: readonly (readonly [string, string])[]): Block[] {
  return entries.length === 0 ? [] : [{ kind: "fields", entries }];
}

/** A list; nothing where it is empty. */
export function listBlock(items: readonly string[], options: { ordered?: boolean; short?: boolean } = {}): Block[] {
  const { ordered = false, short = false } = options;
  return items.length === 0 ? [] : [{ kind: "list", ordered, short, items }];
}

/** A table; nothing where it has no rows. Columns are titles, a leading `>` stands for numbers. */
export function tableBlock(caption: string, columns: readonly string[], rows: readonly (readonly string[])[]): Block[] {
  if (rows.length === 0) return [];
  const described = columns.map(
    (title): DocumentColumn => (title.startsWith(">") ? { title: title.slice(1), align: "right" } : { title }),
  );
  return [{ kind: "table", caption, columns: described, rows }];
}

/** A part that a reader may fold away; nothing where it is empty. */
export function moreBlock(title: string, blocks: readonly Block[]): Block[] {
  return blocks.length === 0 ? [] : [{ kind: "more", title, blocks }];
}
