import type { ScaleLinear } from "d3-scale";
import { coordinate, element, escapeMarkup } from "./mark-up.js";
import { paint } from "./palette.js";

type Scale = ScaleLinear<number, number>;

/** A plain label; `anchor` says which end of it is at x. */
export function label(text: string, x: number, y: number, anchor: "start" | "middle" | "end", size = 12): string {
  return element(
    "text",
    { x, y, "text-anchor": anchor, "font-size": size, ...paint({ fill: "ink" }) },
    escapeMarkup(text),
  );
}

/** Ticks with numbers below a panel. */
export function lowerAxis(x: Scale, base: number, count: number, name: string): string {
  const [from, to] = x.range() as [number, number];
  const format = x.tickFormat(count);
  return element(
    "g",
    {},
    element("path", { d: `M${coordinate(from)} ${coordinate(base)}H${coordinate(to)}`, ...paint({ stroke: "faint" }) }),
    ...x
      .ticks(count)
      .flatMap((tick) => [
        element("path", { d: `M${coordinate(x(tick))} ${coordinate(base)}v5`, ...paint({ stroke: "faint" }) }),
        label(format(tick), x(tick), base + 18, "middle", 11),
      ]),
    label(name, (from + to) / 2, base + 34, "middle"),
  );
}

/** Numbers left of a panel, with a faint line across it for each where `to` says how far. */
export function leftAxis(y: Scale, left: number, to: number | null, count: number): string {
  // Large counts are written with a prefix, 200k: there is no room for their zeros.
  const large = Math.max(...y.domain().map(Math.abs)) >= 1e5;
  const format = large ? y.tickFormat(count, "~s") : y.tickFormat(count);
  return element(
    "g",
    {},
    ...y.ticks(count).flatMap((tick) => [
      element("path", {
        d: to === null ? `M${left} ${coordinate(y(tick))}h-4` : `M${left} ${coordinate(y(tick))}H${coordinate(to)}`,
        ...paint({ stroke: "rule" }),
      }),
      label(format(tick), left - 7, y(tick) + 4, "end", 11),
    ]),
  );
}
