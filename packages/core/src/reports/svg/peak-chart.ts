import { extent } from "d3-array";
import { type ScaleLinear, scaleLinear } from "d3-scale";
import { line, symbol, symbolCircle, symbolDiamond, symbolSquare, symbolTimes, symbolTriangle } from "d3-shape";
import { type Figure, textWidth } from "./figure.js";
import { coordinate, element, escapeMarkup } from "./mark-up.js";
import { paint, seriesRole } from "./palette.js";
import type { ChartCandidate, ChartPeak, PeakChartData } from "./peak-chart-data.js";

/** Which part is drawn, how wide, whose residuals, and the peak that is pointed at. */
export interface PeakChartView {
  readonly width: number;
  readonly from: number;
  readonly to: number;
  readonly candidate: number;
  readonly peak: number | null;
}

type Scale = ScaleLinear<number, number>;

/** Left and right of the panels, in the units of the drawing. */
export const chartMargins = { left: 46, right: 14 } as const;
const { left, right } = chartMargins;
const observedHeight = 104;
const laneHeight = 32;
const residualHeight = 112;
const axisHeight = 44;
const leftOutHeight = 18;
/** Standard uncertainties: the limit of a match. */
const limit = 3;

/** What is drawn where there is no script: everything, with the residuals of the first candidate. */
export function wholeView(data: PeakChartData, width = 940): PeakChartView {
  return { width, from: data.from, to: data.to, candidate: 0, peak: null };
}

/** Observed positions, one lane of predicted lines for each candidate, and the residuals of one of them. */
export function peakChart(data: PeakChartData, view: PeakChartView): Figure {
  const x = positionScale(view);
  const legend = legendMarks(data, view);
  const lanesTop = legend.height + observedHeight + flagsHeight(data);
  const residualTop = lanesTop + data.candidates.length * laneHeight + 22;
  const candidate = data.candidates[view.candidate];
  const bottom = candidate === undefined ? lanesTop + 4 : residualTop + residualHeight;
  const shown = shownPeaks(data, view);
  const numbered = numberedPeaks(data, shown, view);
  const leftOut = shown.length - numbered.size;
  // The height must not change while somebody looks closer or points at a peak.
  const whole = shownPeaks(data, wholeView(data));
  const someLeftOut = numberedPeaks(data, whole, wholeView(data, view.width)).size < whole.length;
  const marks = [
    legend.marks,
    gridMarks(x, legend.height, bottom, data.label, view),
    observedMarks(data, { shown, numbered }, view, x, legend.height),
    ...data.candidates.map((one, index) => laneMarks(one, index, view, x, lanesTop + index * laneHeight)),
    candidate ? residualMarks(data.peaks, candidate, view, x, residualTop) : "",
    leftOut === 0 ? "" : leftOutMark(leftOut, shown.length, view.width, bottom + axisHeight + 12),
  ];
  return {
    width: view.width,
    height: bottom + axisHeight + (someLeftOut ? leftOutHeight : 0),
    title: "Peaks and predicted satellites",
    description: `${data.peaks.length} observed positions above; below them the satellites of ${data.candidates.length} candidates for k${
      candidate ? `, and observed less computed for candidate ${candidate.name}` : ""
    }. The same numbers stand in the tables.`,
    marks: marks.join(""),
  };
}

/** Below the peaks, for the marks of those on nuclear lines and λ/2 images: one row, or two where a peak is on both. */
function flagsHeight({ peaks }: PeakChartData): number {
  return peaks.some((peak) => peak.onNuclear && peak.onHalfWavelength) ? 20 : 10;
}

function positionScale({ from, to, width }: PeakChartView): Scale {
  return scaleLinear([from, to], [left, width - right]);
}

function visible(x: number, view: PeakChartView): boolean {
  return x >= view.from && x <= view.to;
}

/** The axis below, and faint lines through all panels. */
function gridMarks(x: Scale, top: number, bottom: number, label: string, view: PeakChartView): string {
  const count = Math.max(3, Math.floor(view.width / 110));
  const format = x.tickFormat(count);
  const ticks = x.ticks(count);
  return element(
    "g",
    {},
    ...ticks.map((tick) =>
      element("path", { d: `M${coordinate(x(tick))} ${top}V${coordinate(bottom + 5)}`, ...paint({ stroke: "rule" }) }),
    ),
    element("path", {
      d: `M${left} ${coordinate(bottom)}H${coordinate(view.width - right)}`,
      ...paint({ stroke: "faint" }),
    }),
    ...ticks.map((tick) =>
      element(
        "text",
        { x: x(tick), y: bottom + 19, "text-anchor": "middle", ...paint({ fill: "ink" }) },
        escapeMarkup(format(tick)),
      ),
    ),
    element(
      "text",
      { x: (left + view.width - right) / 2, y: bottom + 37, "text-anchor": "middle", ...paint({ fill: "ink" }) },
      escapeMarkup(label),
    ),
  );
}

/** From left to right. */
function shownPeaks({ peaks }: PeakChartData, view: PeakChartView): number[] {
  const place = (index: number) => (peaks[index] as ChartPeak).x;
  return [...peaks.keys()].filter((index) => visible(place(index), view)).sort((a, b) => place(a) - place(b));
}

/** Those whose numbers have room, and the one that is pointed at. */
function numberedPeaks({ peaks }: PeakChartData, shown: readonly number[], view: PeakChartView): ReadonlySet<number> {
  const x = positionScale(view);
  const numbered = new Set<number>();
  let end = Number.NEGATIVE_INFINITY;
  for (const index of shown) {
    const peak = peaks[index] as ChartPeak;
    if (x(peak.x) - end < textWidth(String(peak.number), 11) + 5 && view.peak !== index) continue;
    end = x(peak.x);
    numbered.add(index);
  }
  return numbered;
}

function leftOutMark(leftOut: number, shown: number, width: number, y: number): string {
  return element(
    "text",
    { x: width - right, y, "text-anchor": "end", "font-size": 11, ...paint({ fill: "faint" }) },
    `${leftOut} of ${shown} numbers left out; the table of the report has all`,
  );
}

function observedMarks(
  data: PeakChartData,
  { shown, numbered }: { readonly shown: readonly number[]; readonly numbered: ReadonlySet<number> },
  view: PeakChartView,
  x: Scale,
  top: number,
): string {
  const base = top + observedHeight;
  const assigned = data.candidates[view.candidate]?.assigned;
  const peaks = shown.map((index) =>
    observedPeak(data.peaks[index] as ChartPeak, index, assigned?.[index] !== null, numbered.has(index), view, x, base),
  );
  return element(
    "g",
    { class: "observed" },
    panelName("observed", top + 12),
    element("path", { d: `M${left} ${base}H${coordinate(view.width - right)}`, ...paint({ stroke: "faint" }) }),
    ...peaks,
  );
}

function observedPeak(
  peak: ChartPeak,
  index: number,
  matched: boolean,
  numbered: boolean,
  view: PeakChartView,
  x: Scale,
  base: number,
): string {
  const at = x(peak.x);
  const tip = base - 12 - (observedHeight - 44) * peak.height;
  const chosen = view.peak === index;
  const bar = [
    Math.max(x(peak.x - peak.su), x.range()[0] as number),
    Math.min(x(peak.x + peak.su), x.range()[1] as number),
  ];
  return element(
    "g",
    { class: "peak", "data-peak": index },
    element("path", {
      d: `M${coordinate(at)} ${coordinate(base)}V${coordinate(tip)}`,
      "stroke-width": chosen ? 3.5 : 1.6,
      ...paint({ stroke: "ink" }),
    }),
    peak.su > 0
      ? element("path", {
          d: `M${coordinate(bar[0] as number)} ${coordinate(tip)}H${coordinate(bar[1] as number)}`,
          "stroke-width": 1.6,
          ...paint({ stroke: "ink" }),
        })
      : null,
    stateMark(stateOf(peak, matched), at, tip),
    peak.onNuclear ? stateMark("nuclear", at, base + 7) : null,
    peak.onHalfWavelength ? stateMark("half", at, base + (peak.onNuclear ? 17 : 7)) : null,
    numbered
      ? element(
          "text",
          { x: at, y: tip - (matched ? 9 : 13), "text-anchor": "middle", "font-size": 11, ...paint({ fill: "ink" }) },
          String(peak.number),
        )
      : null,
  );
}

type State = "matched" | "unmatched" | "aside" | "nuclear" | "half";

function stateOf(peak: ChartPeak, matched: boolean): State {
  return peak.setAside ? "aside" : matched ? "matched" : "unmatched";
}

const shapes = {
  matched: { type: symbolCircle, size: 44, text: "matched" },
  unmatched: { type: symbolDiamond, size: 70, text: "not matched" },
  aside: { type: symbolTimes, size: 60, text: "set aside" },
  nuclear: { type: symbolSquare, size: 26, text: "on a nuclear line" },
  half: { type: symbolTriangle, size: 26, text: "on a λ/2 image" },
} as const;

/** What a peak is, by shape; the open diamond is the one that wants an explanation. */
function stateMark(state: State, x: number, y: number): string {
  const { type, size } = shapes[state];
  const colours =
    state === "unmatched"
      ? paint({ fill: "paper", stroke: "warning" })
      : state === "aside"
        ? paint({ fill: "none", stroke: "faint" })
        : state === "matched"
          ? paint({ fill: "ink", stroke: "ink" })
          : paint({ fill: "none", stroke: "faint" });
  return element("path", {
    d: symbol(type, size)() ?? "",
    transform: `translate(${coordinate(x)} ${coordinate(y)})`,
    "stroke-width": state === "unmatched" || state === "aside" ? 2 : 1.2,
    ...colours,
  });
}

/** The shapes that occur, in as many lines as they need. */
function legendMarks(data: PeakChartData, view: PeakChartView): { readonly marks: string; readonly height: number } {
  const assigned = data.candidates[view.candidate]?.assigned;
  const occurring = new Set<State>(
    data.peaks.flatMap((peak, index) => [
      stateOf(peak, assigned?.[index] !== null),
      ...(peak.onNuclear ? (["nuclear"] as const) : []),
      ...(peak.onHalfWavelength ? (["half"] as const) : []),
    ]),
  );
  const marks: string[] = [];
  let [x, y] = [left, 14];
  for (const state of Object.keys(shapes) as State[]) {
    if (!occurring.has(state)) continue;
    const { text } = shapes[state];
    const width = 16 + textWidth(text) + 18;
    if (x + width > view.width && x > left) [x, y] = [left, y + 18];
    marks.push(stateMark(state, x + 5, y - 4));
    marks.push(element("text", { x: x + 16, y, ...paint({ fill: "faint" }) }, escapeMarkup(text)));
    x += width;
  }
  return { marks: element("g", { class: "legend" }, ...marks), height: y + 14 };
}

/** Predicted lines of one candidate; those that peaks were taken for are long. */
function laneMarks(candidate: ChartCandidate, index: number, view: PeakChartView, x: Scale, top: number): string {
  const role = seriesRole(index);
  const base = top + laneHeight;
  const taken = candidate.assigned.flatMap((one) => (one !== null && visible(one.x, view) ? [one.x] : []));
  const stems = (positions: readonly number[], height: number) =>
    positions.map((position) => `M${coordinate(x(position))} ${base}v${-height}`).join("");
  const chosen = index === view.candidate;
  return element(
    "g",
    { class: "lane", "data-candidate": index },
    element("path", {
      d: stems(
        candidate.ticks.filter((tick) => visible(tick, view)),
        8,
      ),
      "stroke-width": 1.2,
      ...paint({ stroke: role }),
    }),
    element("path", { d: stems(taken, 14), "stroke-width": 2.6, ...paint({ stroke: role }) }),
    element("path", { d: `M${left} ${base}H${coordinate(view.width - right)}`, ...paint({ stroke: "rule" }) }),
    element(
      "text",
      { x: left, y: base - 18, "font-size": 11.5, "font-weight": chosen ? 700 : null, ...paint({ fill: role }) },
      escapeMarkup(laneName(candidate, view.width)),
    ),
  );
}

/** The summary stands behind the name where there is room. */
function laneName({ name, summary }: ChartCandidate, width: number): string {
  const long = `${name} — ${summary}`;
  return left + textWidth(long, 11.5) < width - right ? long : name;
}

function residualMarks(
  peaks: readonly ChartPeak[],
  candidate: ChartCandidate,
  view: PeakChartView,
  x: Scale,
  top: number,
): string {
  const offsets = candidate.assigned.map((one) => one?.offset ?? null);
  const [low = 0, high = 0] = extent(offsets.filter((one): one is number => one !== null));
  const reach = Math.max(limit + 0.8, Math.abs(low ?? 0) * 1.1, Math.abs(high ?? 0) * 1.1);
  const y = scaleLinear([-reach, reach], [top + residualHeight, top + 14]);
  const across = (value: number) =>
    line()([
      [left, y(value)],
      [view.width - right, y(value)],
    ]) ?? "";
  const role = seriesRole(view.candidate);
  const points = peaks.flatMap((peak, index) => {
    const offset = offsets[index] ?? null;
    if (offset === null || !visible(peak.x, view)) return [];
    const at = { cx: x(peak.x), cy: y(offset) };
    return [
      element(
        "g",
        { class: "residual", "data-peak": index },
        element("path", {
          d: `M${coordinate(at.cx)} ${coordinate(y(offset - 1))}V${coordinate(y(offset + 1))}`,
          ...paint({ stroke: role }),
        }),
        element("circle", { ...at, r: view.peak === index ? 6 : 3.6, ...paint({ fill: role }) }),
      ),
    ];
  });
  return element(
    "g",
    { class: "residuals" },
    panelName("(observed − computed) / s.u.", top + 6),
    ...[-limit, limit].map((value) =>
      element("path", { d: across(value), "stroke-dasharray": "5 4", ...paint({ stroke: "faint" }) }),
    ),
    element("path", { d: across(0), ...paint({ stroke: "faint" }) }),
    ...[-limit, 0, limit].map((value) =>
      element(
        "text",
        { x: left - 8, y: y(value) + 4, "text-anchor": "end", ...paint({ fill: "ink" }) },
        value < 0 ? `−${-value}` : String(value),
      ),
    ),
    ...points,
  );
}

function panelName(text: string, y: number): string {
  return element("text", { x: left, y, "font-size": 11.5, ...paint({ fill: "faint" }) }, escapeMarkup(text));
}
