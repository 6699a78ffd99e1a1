import type { CifBlock, CifDocument, CifLoop, CifText, CifValue } from "./document.js";
import { lookUpName } from "./names.js";
import { saidText, valueAt } from "./values.js";

/** Where a data name stands in a block. */
export interface CifLocation {
  readonly name: string;
  readonly start: number;
  /** Null for an item with one value. */
  readonly loop: CifLoop | null;
  /** Column of the loop, 0 for an item. */
  readonly column: number;
  /** Offset of the value of an item. */
  readonly value: number;
}

/** A block opened for look-up. Names are given in the older spelling; the newer one is found too, in any case. */
export interface BlockReader {
  readonly document: CifDocument;
  readonly block: CifBlock;
  readonly locations: ReadonlyMap<string, CifLocation>;
  /** Names that stand beside their own other spelling, `_cell.length_a` and `_cell_length_a`. */
  readonly doubled: readonly { readonly first: CifLocation; readonly second: CifLocation }[];
}

export function openBlock(document: CifDocument, block: CifBlock): BlockReader {
  const locations = new Map<string, CifLocation>();
  const doubled: { first: CifLocation; second: CifLocation }[] = [];
  const add = (location: CifLocation): void => {
    const key = lookUpName(location.name);
    const first = locations.get(key);
    if (first) doubled.push({ first, second: location });
    else locations.set(key, location);
  };
  for (const { name, start, value } of block.items) add({ name, start, loop: null, column: 0, value });
  for (const loop of block.loops)
    loop.names.forEach(({ name, start }, column) => {
      add({ name, start, loop, column, value: loop.values[column] as number });
    });
  return { document, block, locations, doubled };
}

/** Where a name stands, null when the block has it not. */
export function locate(reader: BlockReader, name: string): CifLocation | null {
  return reader.locations.get(lookUpName(name)) ?? null;
}

/** All values of a name: those of its column, or the one of an item; empty when the block has it not. */
export function valuesOf(reader: BlockReader, name: string): CifValue[] {
  const found = locate(reader, name);
  if (found === null) return [];
  const { loop, column } = found;
  if (loop === null) return [valueAt(reader.document, found.value)];
  const values: CifValue[] = [];
  for (let index = column; index < loop.values.length; index += loop.names.length)
    values.push(valueAt(reader.document, loop.values[index] as number));
  return values;
}

/** The first value of the first of several names that says something, neither `?` nor `.`. */
export function firstText(reader: BlockReader, ...names: readonly string[]): CifText | null {
  for (const name of names) {
    const found = locate(reader, name);
    const text = found && saidText(valueAt(reader.document, found.value));
    if (text) return text;
  }
  return null;
}

/** One row of a category: the values of the names asked for, null where the loop has not the column. */
export interface CifRow {
  /** Offset of the row's first value, for its place. */
  readonly start: number;
  /** The value of a name, null where the loop has no such column. */
  readonly value: (name: string) => CifValue | null;
}

/**
 * The rows of the loop that holds `key`, with the other names of the same loop; an item without a loop is one row
 * together with all other items.
 */
export function rowsOf(reader: BlockReader, key: string, names: readonly string[]): CifRow[] {
  const main = locate(reader, key);
  if (main === null) return [];
  const columns = new Map<string, CifLocation>();
  for (const name of [key, ...names]) {
    const found = locate(reader, name);
    if (found !== null && found.loop === main.loop) columns.set(name, found);
  }
  const { loop } = main;
  if (loop === null)
    return [
      {
        start: main.value,
        value: (name) => {
          const found = columns.get(name);
          return found ? valueAt(reader.document, found.value) : null;
        },
      },
    ];
  const width = loop.names.length;
  return Array.from({ length: loop.values.length / width }, (_, row) => ({
    start: loop.values[row * width] as number,
    value: (name: string) => {
      const found = columns.get(name);
      return found ? valueAt(reader.document, loop.values[row * width + found.column] as number) : null;
    },
  }));
}
