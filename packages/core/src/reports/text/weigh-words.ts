import { unbroken } from "./layout.js";

/** Names, the first ones and how many more. */
export function namesOf(names: readonly string[], most: number): string {
  const more = names.length - most;
  return `${names.slice(0, most).join(", ")}${more > 0 ? ` ${unbroken(`and ${more} more`)}` : ""}`;
}

export function short(value: number): string {
  return value >= 1000 ? value.toFixed(0) : String(Number(value.toPrecision(4)));
}

export function percent(share: number): string {
  return `${(100 * share).toFixed(1)} %`;
}
