/** The fractions in an answer with more than the 12 significant digits that `roundNumber` leaves. */
export function longNumbers(value: unknown): number[] {
  if (typeof value === "number")
    return Number.isInteger(value) || Number(value.toPrecision(12)) === value ? [] : [value];
  return typeof value === "object" && value !== null ? Object.values(value).flatMap(longNumbers) : [];
}
