/** One line of an input, numbered from 1, without its line end; null in place of one that is too long. */
export interface InputLine {
  readonly number: number;
  readonly bytes: Uint8Array | null;
}

const lineFeed = 10;

/**
 * The lines of an input, one after the other: no more of it is in memory than one line and the part it came with. The
 * next part is asked for when the lines of the last one are done. A last line needs no line feed.
 *
 * @param parts the input as it comes, cut anywhere
 * @param longest bytes of a line; of longer ones only the place is told
 */
export async function* linesOf(parts: AsyncIterable<Uint8Array>, longest: number): AsyncGenerator<InputLine> {
  let number = 0;
  let kept: Uint8Array[] = [];
  let length = 0;
  const keep = (piece: Uint8Array) => {
    length += piece.length;
    if (length > longest) kept = [];
    else if (piece.length > 0) kept.push(piece);
  };
  const take = (): InputLine => {
    const bytes = length > longest ? null : joined(kept, length);
    kept = [];
    length = 0;
    number += 1;
    return { number, bytes };
  };
  for await (const part of parts) {
    let start = 0;
    for (;;) {
      const end = part.indexOf(lineFeed, start);
      if (end < 0) break;
      keep(part.subarray(start, end));
      yield take();
      start = end + 1;
    }
    keep(part.subarray(start));
  }
  if (length > 0) yield take();
}

function joined(pieces: readonly Uint8Array[], length: number): Uint8Array {
  const [first] = pieces;
  if (first !== undefined && pieces.length === 1) return first;
  const whole = new Uint8Array(length);
  let at = 0;
  for (const piece of pieces) {
    whole.set(piece, at);
    at += piece.length;
  }
  return whole;
}
