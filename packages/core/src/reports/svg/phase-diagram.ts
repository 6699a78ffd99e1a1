import { scaleLinear } from "d3-scale";
import type { DiagramRecord } from "../records/exchange.js";
import { phaseLetter, setText } from "../text/exchange-diagram-text.js";
import { plain } from "../text/names.js";
import { label, leftAxis, lowerAxis } from "./axis-marks.js";
import { type Figure, textWidth } from "./figure.js";
import { coordinate, element, escapeMarkup } from "./mark-up.js";
import { paint, seriesRole } from "./palette.js";

const width = 940;
const left = 66;
const right = 14;
const top = 26;
const mapHeight = 420;
const energyHeight = 170;
const stripHeight = 30;
const axisHeight = 50;
const legendStep = 20;

/** Size of the letters in the cells; where a cell has less room, only every so-many-th has one. */
const letterSize = 11;

/** Which k is preferred where: cells of a map over two constants, or energies and a strip of cells along one. */
export function phaseDiagramChart(diagram: DiagramRecord): Figure {
  const [first, second] = diagram.axes;
  if (first === undefined) throw new TypeError("a phase diagram without a constant that runs");
  const panel = second === undefined ? linePanel(diagram) : mapPanel(diagram);
  const legend = legendMarks(diagram, panel.height + 8);
  const names = diagram.axes.map(({ name, from, to }) => `J${name} from ${plain(from)} to ${plain(to)}`).join(" and ");
  return {
    width,
    height: panel.height + legend.height + 16,
    title: "Phase diagram of the exchange model",
    description: `The k of lowest energy for ${names}: ${diagram.points.length} points, each with the letter and colour of its phase. The table of points has the same numbers.`,
    marks: panel.marks + legend.marks,
  };
}

type Axis = DiagramRecord["axes"][number];

/** Pixels of value n: each cell is centred on its value, so that the axis goes on half a step at both ends. */
function cellScale({ from, to, count }: Axis, range: readonly [number, number]) {
  const half = (to - from) / (count - 1) / 2;
  return scaleLinear([from - half, to + half], range);
}

function mapPanel({ axes, points }: DiagramRecord) {
  const [first, second] = axes as readonly [Axis, Axis];
  const base = top + mapHeight;
  const x = cellScale(first, [left, width - right]);
  const y = cellScale(second, [base, top]);
  const size = { width: (width - left - right) / first.count, height: mapHeight / second.count };
  const across = Math.ceil((letterSize + 1) / size.width);
  const upwards = Math.ceil((letterSize + 3) / size.height);
  const cells = points.map(({ values, phase }, index) => {
    const [a, b] = values as readonly [number, number];
    const [column, row] = [index % first.count, Math.floor(index / first.count)];
    return cell(x(a), y(b), size, phase, column % across === 0 && row % upwards === 0);
  });
  return {
    height: base + axisHeight,
    marks: [
      ...cells,
      lowerAxis(x, base, 8, `J${first.name}`),
      leftAxis(y, left, null, 6),
      label(`J${second.name}`, left, top - 10, "middle"),
    ].join(""),
  };
}

function linePanel({ axes, points, boundaries }: DiagramRecord) {
  const [axis] = axes as readonly [Axis];
  const stripTop = top + energyHeight + 12;
  const base = stripTop + stripHeight;
  const x = cellScale(axis, [left, width - right]);
  const y = scaleLinear(reach(points.map(({ energy }) => energy)), [top + energyHeight, top]).nice(4);
  const size = { width: (width - left - right) / axis.count, height: stripHeight };
  const every = Math.ceil((letterSize + 1) / size.width);
  const place = ({ values, energy }: DiagramRecord["points"][number]): readonly [number, number] => [
    x(values[0] as number),
    y(energy),
  ];
  const path = points.map((point) => place(point).map(coordinate).join(" ")).join("L");
  return {
    height: base + axisHeight,
    marks: [
      leftAxis(y, left, width - right, 4),
      label("energy a spin", left, top - 10, "start"),
      element("path", { d: `M${path}`, "stroke-width": 1.2, ...paint({ fill: "none", stroke: "faint" }) }),
      ...points.map((point) => {
        const [cx, cy] = place(point);
        return element("circle", {
          cx,
          cy,
          r: 3,
          "data-phase": point.phase,
          ...paint({ fill: seriesRole(point.phase) }),
        });
      }),
      ...points.map(({ values, phase }, index) =>
        cell(x(values[0] as number), stripTop + stripHeight / 2, size, phase, index % every === 0),
      ),
      ...(boundaries ?? []).map(({ value, sudden }) =>
        element("path", {
          d: `M${coordinate(x(value))} ${top}V${base}`,
          "stroke-width": 1.6,
          // Gradual changes are dashed: k itself does not jump there.
          "stroke-dasharray": sudden ? null : "5 4",
          ...paint({ stroke: "ink" }),
        }),
      ),
      lowerAxis(x, base, 8, `J${axis.name}`),
    ].join(""),
  };
}

/** A level curve still wants a panel with some height. */
function reach(values: readonly number[]): [number, number] {
  const [least, most] = [Math.min(...values), Math.max(...values)];
  const room = most - least > 1e-9 * Math.abs(most) ? 0 : Math.abs(most) * 0.05 || 1;
  return [least - room, most + room];
}

function cell(
  x: number,
  y: number,
  size: { readonly width: number; readonly height: number },
  phase: number,
  lettered: boolean,
): string {
  const shape = element("rect", {
    x: x - size.width / 2,
    y: y - size.height / 2,
    ...size,
    "data-phase": phase,
    // Letters in the ink of the text must stay readable on it.
    "fill-opacity": "0.3",
    ...paint({ fill: seriesRole(phase) }),
  });
  return lettered ? shape + label(phaseLetter(phase), x, y + 4, "middle", letterSize) : shape;
}

/** A line for each phase: its letter, the k, and how large the set of them is. */
function legendMarks(diagram: DiagramRecord, from: number) {
  const marks = diagram.phases.map(({ forms, dimension }, index) => {
    const y = from + index * legendStep + legendStep / 2;
    const name = forms.join(" and ");
    return [
      cell(left + 9, y, { width: 18, height: 16 }, index, true),
      label(name, left + 28, y + 4, "start"),
      element(
        "text",
        { x: left + 28 + textWidth(name) + 14, y: y + 4, ...paint({ fill: "faint" }) },
        escapeMarkup(setText(dimension, diagram.freeDirections)),
      ),
    ].join("");
  });
  return { marks: marks.join(""), height: diagram.phases.length * legendStep };
}
