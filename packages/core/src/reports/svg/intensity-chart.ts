import { scaleLinear } from "d3-scale";
import type { WeighDataRecord, WeighedRecord } from "../records/weigh.js";
import { type Figure, textWidth } from "./figure.js";
import { coordinate, element, escapeMarkup } from "./mark-up.js";
import { paint } from "./palette.js";

const width = 940;
const left = 46;
const right = 14;
const top = 24;
const height = 132;
const axisHeight = 40;

const panelHeight = top + height + axisHeight;

/** Observed intensities as points with ±1 s.u. on the bars of the calculated ones, a panel for each configuration. */
export function intensityChart(data: WeighDataRecord, shown: readonly WeighedRecord[]): Figure {
  const names = shown.map(({ id }) => id).join(", ");
  return {
    width,
    height: shown.length * panelHeight,
    title: `Observed and calculated intensities of ${names}`,
    description: `${data.list.length} intensities: bars are calculated for the best fits of ${names}, points are observed with one standard uncertainty. The same numbers stand in the table.`,
    marks: shown
      .map((one, index) => element("g", { transform: `translate(0 ${index * panelHeight})` }, panelMarks(data, one)))
      .join(""),
  };
}

function panelMarks({ list, sample }: WeighDataRecord, one: WeighedRecord): string {
  const largest = Math.max(...list.map(({ observed, su }) => observed + su), ...one.calculated, 0) || 1;
  const y = scaleLinear([0, largest], [top + height, top]);
  const step = (width - left - right) / Math.max(1, list.length);
  const bar = Math.min(22, 0.7 * step);
  const base = y(0);
  const middle = (index: number): number => left + (index + 0.5) * step;
  const named = namesWithRoom(list, middle);
  const leftOut = list.length - named.length;
  const marks = [
    ...y.ticks(3).map((tick) =>
      element(
        "g",
        {},
        element("path", {
          d: `M${left} ${coordinate(y(tick))}H${width - right}`,
          ...paint({ stroke: tick === 0 ? "faint" : "rule" }),
        }),
        element(
          "text",
          { x: left - 6, y: y(tick) + 4, "text-anchor": "end", "font-size": 11, ...paint({ fill: "ink" }) },
          escapeMarkup(tick === 0 ? "0" : y.tickFormat(3, "~s")(tick)),
        ),
      ),
    ),
    ...one.calculated.map((value, index) =>
      element("rect", {
        x: middle(index) - bar / 2,
        y: Math.min(base, y(value)),
        width: bar,
        height: Math.max(0, Math.abs(base - y(value))),
        "fill-opacity": "0.55",
        ...paint({ fill: "c0" }),
      }),
    ),
    ...list.map(({ observed, su }, index) =>
      observedMark(middle(index), y(observed), y(observed + su), y(observed - su)),
    ),
    ...named.map(({ name, x }) =>
      element(
        "text",
        { x, y: base + 16, "text-anchor": "middle", "font-size": 11, ...paint({ fill: "faint" }) },
        escapeMarkup(name),
      ),
    ),
    element(
      "text",
      { x: left, y: 14, ...paint({ fill: "ink" }) },
      escapeMarkup(`${one.id}: bars calculated, points observed with ±1 s.u.`),
    ),
    element(
      "text",
      { x: (left + width - right) / 2, y: base + 34, "text-anchor": "middle", ...paint({ fill: "ink" }) },
      `${sample === "powder" ? "peak" : "h k l"}${leftOut === 0 ? "" : ` (${leftOut} of ${list.length} names left out; the table of the report has all)`}`,
    ),
  ];
  return marks.join("");
}

function observedMark(x: number, at: number, upper: number, lower: number): string {
  return element(
    "g",
    {},
    element("path", {
      d: `M${coordinate(x)} ${coordinate(upper)}V${coordinate(lower)}`,
      "stroke-width": 1.4,
      ...paint({ stroke: "ink" }),
    }),
    element("circle", { cx: x, cy: at, r: 2.6, ...paint({ fill: "ink" }) }),
  );
}

/** Short names to stand below, those that have room. */
function namesWithRoom(
  list: WeighDataRecord["list"],
  middle: (index: number) => number,
): { readonly name: string; readonly x: number }[] {
  let end = Number.NEGATIVE_INFINITY;
  return list.flatMap(({ label, hkl }, index) => {
    const name = hkl === null ? label.replace(/^peak /, "") : label;
    const half = textWidth(name, 11) / 2;
    const x = middle(index);
    if (x - half < end + 4) return [];
    end = x + half;
    return [{ name, x }];
  });
}
