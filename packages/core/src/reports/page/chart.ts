import { inlineSvg } from "../svg/figure.js";
import { chartMargins, type PeakChartView, peakChart, wholeView } from "../svg/peak-chart.js";
import type { PeakChartData } from "../svg/peak-chart-data.js";
import { button, choice, make, oncePerFrame, replaceDrawing } from "./dom.js";
import { peakText } from "./readout.js";

type MutableView = { -readonly [key in keyof PeakChartView]: PeakChartView[key] };

/** The peak chart with zoom by mouse, touch and keyboard, a choice of candidate, and peaks that can be read off. */
export function liveChart(holder: HTMLElement, data: PeakChartData): void {
  const stage = holder.querySelector<HTMLElement>(".stage");
  if (stage === null) return;
  stage.classList.add("live-on");
  const view: MutableView = { ...wholeView(data) };
  const readout = make("output", { class: "readout", "aria-live": "polite" });
  const draw = oncePerFrame(() => {
    view.width = Math.max(320, Math.round(stage.clientWidth));
    replaceDrawing(stage, inlineSvg(peakChart(data, view), holder.id));
    readout.textContent = view.peak === null ? rangeText(data, view) : peakText(data, view.peak, view.candidate);
  });
  const show = (from: number, to: number) => {
    const least = (data.to - data.from) / 5000;
    const span = Math.min(Math.max(to - from, least), data.to - data.from);
    view.from = Math.min(Math.max(from, data.from), data.to - span);
    view.to = view.from + span;
    draw();
  };
  const zoom = (factor: number, at = (view.from + view.to) / 2) =>
    show(at - (at - view.from) / factor, at + (view.to - at) / factor);
  const move = (share: number) =>
    show(view.from + share * (view.to - view.from), view.to + share * (view.to - view.from));
  const whole = () => show(data.from, data.to);
  const point = (peak: number | null) => {
    view.peak = peak;
    const x = peak === null ? undefined : data.peaks[peak]?.x;
    if (x !== undefined && (x < view.from || x > view.to))
      move((x - (view.from + view.to) / 2) / (view.to - view.from));
    draw();
  };
  const actions = { zoom, move, whole, point };
  stage.before(toolBar(data, view, actions, draw));
  stage.after(readout, make("p", { class: "hint" }, hint));
  keyboard(stage, data, view, actions);
  pointer(stage, data, view, { ...actions, show });
  new ResizeObserver(draw).observe(stage);
  draw();
}

const hint =
  "Drag over a range to look closer, double-click for the whole. With the chart focused: arrow keys move, + and − zoom, Home shows the whole, N and P step through the peaks.";

interface Actions {
  readonly zoom: (factor: number, at?: number) => void;
  readonly move: (share: number) => void;
  readonly whole: () => void;
  readonly point: (peak: number | null) => void;
}

function toolBar(
  data: PeakChartData,
  view: MutableView,
  { zoom, move, whole }: Actions,
  draw: () => void,
): HTMLElement {
  return make(
    "div",
    { class: "tools", role: "toolbar", "aria-label": "Chart" },
    button("+", "Look closer", () => zoom(1.6)),
    button("−", "See more", () => zoom(1 / 1.6)),
    button("←", "To the left", () => move(-0.25)),
    button("→", "To the right", () => move(0.25)),
    button("Whole", "Show the whole range", whole),
    choice(
      "Residuals of",
      data.candidates.map(({ name }) => name),
      view.candidate,
      (index) => {
        view.candidate = index;
        draw();
      },
    ),
  );
}

function rangeText({ label, decimals, peaks }: PeakChartData, { from, to }: PeakChartView): string {
  const inside = peaks.filter(({ x }) => x >= from && x <= to).length;
  return `${label}: ${from.toFixed(decimals - 1)} to ${to.toFixed(decimals - 1)}, ${inside} of ${peaks.length} peaks`;
}

function keyboard(stage: HTMLElement, data: PeakChartData, view: MutableView, actions: Actions): void {
  const order = data.peaks.map((_, index) => index).sort((a, b) => (data.peaks[a]?.x ?? 0) - (data.peaks[b]?.x ?? 0));
  const step = (by: number) => {
    const place = view.peak === null ? (by > 0 ? -1 : order.length) : order.indexOf(view.peak);
    actions.point(order[Math.min(Math.max(place + by, 0), order.length - 1)] ?? null);
  };
  const keys: { readonly [key: string]: () => void } = {
    ArrowLeft: () => actions.move(-0.2),
    ArrowRight: () => actions.move(0.2),
    "+": () => actions.zoom(1.5),
    "=": () => actions.zoom(1.5),
    "-": () => actions.zoom(1 / 1.5),
    Home: actions.whole,
    n: () => step(1),
    p: () => step(-1),
    Escape: () => actions.point(null),
  };
  stage.addEventListener("keydown", (event) => {
    const action = keys[event.key.length === 1 ? event.key.toLowerCase() : event.key];
    if (action === undefined || event.ctrlKey || event.metaKey || event.altKey) return;
    event.preventDefault();
    action();
  });
}

/** A mouse draws a range to look at; a finger moves the chart; the wheel zooms a chart that has the focus. */
function pointer(
  stage: HTMLElement,
  data: PeakChartData,
  view: MutableView,
  actions: Actions & { readonly show: (from: number, to: number) => void },
): void {
  const valueAt = (clientX: number) => {
    const box = stage.getBoundingClientRect();
    const inner = box.width - chartMargins.left - chartMargins.right;
    const share = (clientX - box.left - chartMargins.left) / inner;
    return view.from + Math.min(Math.max(share, 0), 1) * (view.to - view.from);
  };
  const range = make("div", { class: "range", hidden: true });
  let start: number | null = null;
  let last = 0;
  stage.addEventListener("pointerdown", (event) => {
    if (event.button !== 0) return;
    start = event.clientX;
    last = event.clientX;
    stage.setPointerCapture(event.pointerId);
  });
  stage.addEventListener("pointermove", (event) => {
    if (start === null) return actions.point(nearest(data, valueAt(event.clientX), view));
    if (event.pointerType !== "mouse") {
      actions.move((valueAt(last) - valueAt(event.clientX)) / (view.to - view.from));
      last = event.clientX;
      return;
    }
    const left = stage.getBoundingClientRect().left;
    stage.append(range);
    range.hidden = false;
    range.style.left = `${Math.min(start, event.clientX) - left}px`;
    range.style.width = `${Math.abs(event.clientX - start)}px`;
  });
  const end = (event: PointerEvent, done: boolean) => {
    if (start === null) return;
    const ends = [valueAt(start), valueAt(event.clientX)].sort((a, b) => a - b) as [number, number];
    const drawn = !range.hidden && Math.abs(event.clientX - start) > 6;
    range.hidden = true;
    start = null;
    if (done && drawn) actions.show(...ends);
  };
  stage.addEventListener("pointerup", (event) => end(event, true));
  stage.addEventListener("pointercancel", (event) => end(event, false));
  stage.addEventListener("pointerleave", () => actions.point(null));
  stage.addEventListener("dblclick", actions.whole);
  stage.addEventListener(
    "wheel",
    (event) => {
      if (document.activeElement !== stage) return;
      event.preventDefault();
      actions.zoom(event.deltaY < 0 ? 1.25 : 0.8, valueAt(event.clientX));
    },
    { passive: false },
  );
}

/** The peak under the pointer, within a hundredth of the width. */
function nearest({ peaks }: PeakChartData, x: number, { from, to }: PeakChartView): number | null {
  let best: number | null = null;
  let distance = (to - from) / 80;
  peaks.forEach((peak, index) => {
    if (Math.abs(peak.x - x) >= distance) return;
    best = index;
    distance = Math.abs(peak.x - x);
  });
  return best;
}
