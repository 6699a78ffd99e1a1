import type { DiagramRecord } from "../records/exchange.js";
import { paragraph, table } from "./layout.js";
import { plain } from "./names.js";

/** Phases with their letters, then boundaries along one constant or a map over two. */
export function diagramLines(diagram: DiagramRecord): string[] {
  return [
    ...table(
      [{ title: "phase" }, { title: "k" }, { title: "set" }],
      diagram.phases.map(({ forms, dimension }, index) => [
        phaseLetter(index),
        forms.join(" and "),
        setText(dimension, diagram.freeDirections),
      ]),
    ),
    "",
    ...(diagram.axes.length === 1 ? lineOf(diagram) : mapOf(diagram)),
  ];
}

/** Directions that no bond notices do not count. */
export function setText(dimension: number, free: number): string {
  if (dimension === free) return "isolated";
  return ["isolated", "line or ring", "surface", "all k"][dimension - free] ?? "";
}

/** What a phase is called in tables and drawings. */
export function phaseLetter(index: number): string {
  return index < 26 ? String.fromCharCode(65 + index) : index < 52 ? String.fromCharCode(71 + index) : "?";
}

function lineOf({ axes, points, boundaries }: DiagramRecord): string[] {
  const [axis] = axes;
  const name = `J${axis?.name ?? ""}`;
  return [
    ...paragraph(
      `${name} from ${plain(axis?.from ?? 0)} to ${plain(axis?.to ?? 0)}: ${points.map(({ phase }) => phaseLetter(phase)).join("")}`,
    ),
    ...((boundaries ?? []).length === 0
      ? paragraph("One phase throughout.")
      : [
          "",
          ...table(
            [{ title: `boundary at ${name}`, align: "right" }, { title: "from" }, { title: "to" }, { title: "k" }],
            (boundaries ?? []).map(({ value, from, to, sudden }) => [
              String(Number(value.toPrecision(7))),
              phaseLetter(from),
              phaseLetter(to),
              sudden ? "jumps" : "moves away gradually",
            ]),
          ),
        ]),
  ];
}

const widest = 80;

function mapOf({ axes, points }: DiagramRecord): string[] {
  const [first, second] = axes;
  if (!first || !second) return [];
  const stride = Math.max(1, Math.ceil(first.count / widest));
  const rows = Array.from({ length: second.count }, (_, index) => second.count - 1 - index).map((row) => {
    const own = points.slice(row * first.count, (row + 1) * first.count).filter((_, column) => column % stride === 0);
    const value = own[0]?.values[1] ?? 0;
    return `${plain(Number(value.toPrecision(4))).padStart(10)}  ${own.map(({ phase }) => phaseLetter(phase)).join("")}`;
  });
  return [
    ...paragraph(
      `J${second.name} upwards, J${first.name} from ${plain(first.from)} to ${plain(first.to)} to the right${stride > 1 ? ` (every ${stride}th value)` : ""}:`,
    ),
    ...rows,
  ];
}
