import { largestMeasured, smallestMeasured } from "../numbers/index.js";

/** Whether a measured number or its uncertainty can have that size. */
export function isMeasurable(value: number): boolean {
  const size = Math.abs(value);
  return size === 0 || (size >= smallestMeasured && size <= largestMeasured);
}

/** What is expected of one that cannot. */
export const measurableText = `0, or a size from ${smallestMeasured} to ${largestMeasured}`;
