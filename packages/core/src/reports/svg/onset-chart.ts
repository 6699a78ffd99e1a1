import { scaleLinear } from "d3-scale";
import { withUncertainty } from "../../numbers/index.js";
import type { OnsetRecord, PeakOnsetRecord, PowerLawRecord } from "../records/onset.js";
import { label, leftAxis, lowerAxis } from "./axis-marks.js";
import type { Figure } from "./figure.js";
import { coordinate, element } from "./mark-up.js";
import { paint } from "./palette.js";

const columns = 2;
const panelWidth = 470;
const left = 58;
const right = 16;
const top = 28;
const height = 150;
const panelHeight = top + height + 48;

interface Panel {
  readonly name: string;
  readonly data: PeakOnsetRecord["data"];
  readonly fit: PowerLawRecord | null;
}

/** Every column of a scan against temperature in a panel of its own, with ±1 s.u. and the law where one was fitted. */
export function onsetChart({ file, peaks, k }: OnsetRecord): Figure {
  const panels: Panel[] = [...peaks, ...k.map((one) => ({ ...one, fit: null }))];
  const temperatures = panels.flatMap(({ data }) => data.temperatures);
  const x = scaleLinear([Math.min(...temperatures), Math.max(...temperatures)], [left, panelWidth - right]).nice(6);
  return {
    width: Math.min(columns, Math.max(1, panels.length)) * panelWidth,
    height: Math.ceil(panels.length / columns) * panelHeight,
    title: `Temperature scan ${file}`,
    description: `${panels.map(({ name }) => name).join(", ")} against temperature: points with one standard uncertainty where it is given, curves are fitted laws over the range that they were fitted to, dashed lines the temperatures of onset.`,
    marks: panels
      .map((panel, index) =>
        element(
          "g",
          {
            transform: `translate(${(index % columns) * panelWidth} ${Math.floor(index / columns) * panelHeight})`,
          },
          panelMarks(panel, x),
        ),
      )
      .join(""),
  };
}

function panelMarks({ name, data, fit }: Panel, x: ReturnType<typeof scaleLinear<number, number>>): string {
  const base = top + height;
  const { temperatures, values, uncertainties } = data;
  const ends = values.flatMap((value, index) => [-1, 1].map((sign) => value + sign * (uncertainties?.[index] ?? 0)));
  const [least, most] = [Math.min(...ends), Math.max(...ends)];
  const room = 0.06 * (most - least) || 1;
  const y = scaleLinear([least - room, most + room], [base, top]);
  const heading = fit === null ? name : `${name}: T_N = ${withUncertainty(fit.transition.value, fit.transition.su)} K`;
  return [
    leftAxis(y, left, panelWidth - right, 4),
    label(heading, left, top - 10, "start"),
    fit === null ? "" : lawMarks(fit, x, y, base),
    ...temperatures.map((temperature, index) => {
      const value = values[index] as number;
      const su = uncertainties?.[index] ?? 0;
      const at = coordinate(x(temperature));
      return (
        (su > 0
          ? element("path", {
              d: `M${at} ${coordinate(y(value - su))}V${coordinate(y(value + su))}`,
              ...paint({ stroke: "ink" }),
            })
          : "") + element("circle", { cx: x(temperature), cy: y(value), r: 2.6, ...paint({ fill: "ink" }) })
      );
    }),
    lowerAxis(x, base, 6, "T / K"),
  ].join("");
}

/** Steps of the curve below the onset, closer together towards it, where the law is steep. */
const curveSteps = 40;

function lawMarks(
  { transition, beta, amplitude, background, from, to }: PowerLawRecord,
  x: (value: number) => number,
  y: (value: number) => number,
  base: number,
): string {
  const onset = transition.value;
  const below = Array.from({ length: curveSteps + 1 }, (_, n) => onset - (onset - from) * (1 - n / curveSteps) ** 2);
  const points = [...below, Math.max(onset, to)].map((temperature) => {
    const reduced = Math.max(0, 1 - temperature / onset);
    const value = amplitude.value * reduced ** (2 * beta.value) + background.value;
    return `${coordinate(x(temperature))} ${coordinate(y(value))}`;
  });
  return [
    element("path", {
      d: `M${coordinate(x(onset))} ${top}V${base}`,
      "stroke-dasharray": "5 4",
      ...paint({ stroke: "faint" }),
    }),
    element("path", { d: `M${points.join("L")}`, "stroke-width": 1.8, ...paint({ fill: "none", stroke: "c0" }) }),
  ].join("");
}
