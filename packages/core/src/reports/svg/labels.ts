import { textWidth } from "./figure.js";

/** Keeps labels of one drawing apart: each is asked for with the places that it may have, the best first. */
export interface LabelPlaces {
  /** The first free place, or the first of all; it is taken from then on. */
  readonly place: (
    text: string,
    letters: number,
    choices: readonly (readonly [x: number, y: number])[],
  ) => readonly [number, number];
  /** Keeps a spot free of labels. */
  readonly block: (x: number, y: number, radius: number) => void;
}

interface Box {
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

export function labelPlaces(): LabelPlaces {
  const taken: Box[] = [];
  const overlap = (a: Box, b: Box) =>
    Math.max(0, Math.min(a.right, b.right) - Math.max(a.left, b.left)) *
    Math.max(0, Math.min(a.bottom, b.bottom) - Math.max(a.top, b.top));
  return {
    place: (text, letters, choices) => {
      const width = textWidth(text, letters);
      const boxes = choices.map(
        ([x, y]): Box => ({ left: x, right: x + width, top: y - 0.8 * letters, bottom: y + 2 }),
      );
      const costs = boxes.map((box) => taken.reduce((sum, other) => sum + overlap(box, other), 0));
      const best = costs.indexOf(Math.min(...costs));
      taken.push(boxes[best] as Box);
      return choices[best] as readonly [number, number];
    },
    block: (x, y, radius) => {
      taken.push({ left: x - radius, right: x + radius, top: y - radius, bottom: y + radius });
    },
  };
}
