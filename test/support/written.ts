import { exactWaveVector, type WaveVector } from "@kvane/core/kvectors";
import type { Site } from "@kvane/core/spacegroups";

/** A fraction as the tests write it: `1/3`, `-1/2`, `0`, `0.137`. */
export function fraction(text: string): [number, number] {
  const found = /^(-?)(\d+)(?:\/(\d+)|\.(\d+))?$/.exec(text.trim());
  if (!found) throw new Error(`no fraction: ${text}`);
  const [, sign, whole = "0", bottom, decimals] = found;
  const denominator = bottom !== undefined ? Number(bottom) : 10 ** (decimals ?? "").length;
  return reduced((sign === "-" ? -1 : 1) * Number(`${whole}${decimals ?? ""}`), denominator);
}

export function reduced(top: number, bottom: number): [number, number] {
  let [a, b] = [Math.abs(top), bottom];
  while (b !== 0) [a, b] = [b, a % b];
  return [top / a + 0, bottom / a];
}

type Triple = [[number, number], [number, number], [number, number]];

/** `"1/2 0 u"` without the letters: three fractions. */
export function triple(text: string): Triple {
  return text
    .trim()
    .split(/[\s,]+/)
    .map(fraction) as Triple;
}

/** The exact k that is written. */
export function wave(text: string): WaveVector {
  return exactWaveVector(triple(text));
}

export function site(label: string, text: string): Site {
  return { label, position: triple(text) };
}

/** A triplet of the reference files, `-y,x-y,z+2/3`, as rotation and translation in floats. */
export function tripletNumbers(text: string): { rotation: number[]; translation: number[] } {
  const rotation: number[] = [];
  const translation: number[] = [];
  for (const part of text.split(",")) {
    const row = [0, 0, 0];
    let shift = 0;
    for (const [, sign, body] of part.matchAll(/([+-]?)([xyz]|\d+(?:\/\d+)?)/g)) {
      const factor = sign === "-" ? -1 : 1;
      const axis = ["x", "y", "z"].indexOf(body as string);
      if (axis >= 0) row[axis] = (row[axis] as number) + factor;
      else {
        const [top, bottom] = fraction(body as string);
        shift += (factor * top) / bottom;
      }
    }
    rotation.push(...row);
    translation.push(shift);
  }
  return { rotation, translation };
}
