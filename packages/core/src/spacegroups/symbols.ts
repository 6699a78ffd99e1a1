import type { TabulatedSetting } from "./types.js";

/** One direction of a short symbol whose screw subscripts carry `_`: an axis, an axis over a plane, or a plane. */
const direction = /-?[12346](?:_[1-5])?(?:\/[abcdemn])?|[abcdemn]/g;

/** `P2_1/c` → `P 2_1/c`; a symbol with blanks stays. */
export function spacedSymbol(symbol: string): string {
  if (symbol.includes(" ")) return symbol;
  return [symbol.slice(0, 1), ...(symbol.slice(1).match(direction) ?? [])].join(" ");
}

/** The symbol that outputs carry: the full one where the short one hides the unique axis (monoclinic), else the short. */
export function displaySymbol(setting: TabulatedSetting): string {
  return setting.number >= 3 && setting.number <= 15 ? setting.full : spacedSymbol(setting.short);
}

/** Symbol and setting code: `P 1 2_1/n 1:b2`, `P b n m:cab`, `P n m a`. */
export function symbolWithCode(setting: TabulatedSetting): string {
  return `${displaySymbol(setting)}${setting.choice === "" ? "" : `:${setting.choice}`}`;
}
