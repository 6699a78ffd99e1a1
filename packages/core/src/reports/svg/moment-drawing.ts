import type { Figure } from "./figure.js";
import { coordinate, element, escapeMarkup } from "./mark-up.js";
import type { MomentBox } from "./moment-box.js";
import type { MomentScene } from "./moment-data.js";
import { momentsOf } from "./moments.js";
import { paint, seriesRole } from "./palette.js";
import { combine, cross, dot, plus, times, type Vector, type View, viewFrom } from "./space.js";

const axisNames = ["a", "b", "c"] as const;
/** The longest side of the box of cells, and at most so much for an Å. */
const longestSide = 320;
const largestScale = 48;
const longestArrow = 42;
const margin = 48;
/** Share of a moment along the line of sight above which it is drawn as a dot or a cross. */
const alongSight = 0.95;

/** Three drawings of one arrangement to one scale, as seen from the ends of a, b and c. */
export function momentProjections(scene: MomentScene, arrangement: number): readonly Figure[] {
  return boxProjections(scene, momentsOf(scene, arrangement).vectors, "Moments");
}

/** The same of any atoms with moments; titles begin with `what`. */
export function boxProjections(box: MomentBox, vectors: readonly Vector[], what: string): readonly Figure[] {
  const views = ([0, 1, 2] as const).map((axis) => viewFrom(box.axes[axis], box.axes[nextAxis(axis)]));
  const sides = views.map((view) => boxOf(box, view)).flatMap(({ x, y }) => [x[1] - x[0], y[1] - y[0]]);
  const scale = Math.min(longestSide / Math.max(...sides), largestScale);
  return ([0, 1, 2] as const).map((axis) => projection(box, vectors, { axis, view: views[axis] as View, scale, what }));
}

function nextAxis(axis: number): 0 | 1 | 2 {
  return ((axis + 1) % 3) as 0 | 1 | 2;
}

interface Projection {
  readonly axis: 0 | 1 | 2;
  readonly view: View;
  /** Of the drawing, for an Å. */
  readonly scale: number;
  readonly what: string;
}

function projection(scene: MomentBox, vectors: readonly Vector[], { axis, view, scale, what }: Projection): Figure {
  const box = boxOf(scene, view);
  const flat: Flat = (point) => [
    margin + (dot(point, view.right) - box.x[0]) * scale,
    margin + (-dot(point, view.up) - box.y[0]) * scale,
  ];
  const arrow = arrowLength(scene, scale);
  const atoms = scene.atoms
    .map((atom, index) => {
      const place = combine(scene.axes, atom.at);
      return { site: atom.site, place, moment: vectors[index] as Vector, depth: dot(place, view.towards), index };
    })
    .sort((a, b) => Number((a.depth - b.depth).toFixed(6)) || a.index - b.index);
  const depths = atoms.map(({ depth }) => depth);
  const [far, near] = [Math.min(...depths), Math.max(...depths)];
  return {
    width: Math.round((box.x[1] - box.x[0]) * scale + 2 * margin),
    height: Math.round((box.y[1] - box.y[0]) * scale + 2 * margin),
    title: `${what} seen along ${axisNames[axis]}`,
    description: `${atoms.length} atoms in ${scene.cells.join(" × ")} cells, seen from the end of ${axisNames[axis]}; arrows are moments, ⊙ points to the eye, ⊗ away from it.`,
    marks: [
      cellMarks(scene, axis, flat),
      ...atoms.map(({ site, place, moment, depth }) =>
        atomMarks(site, flat(place), [dot(moment, view.right), -dot(moment, view.up), dot(moment, view.towards)], {
          arrow,
          // What is far is paler.
          strength: near - far < 1e-6 ? 1 : 0.45 + (0.55 * (depth - far)) / (near - far),
        }),
      ),
    ].join(""),
  };
}

/** From where to where the box of cells goes in a view, to the right and downwards, in Å. */
function boxOf({ axes, cells }: MomentBox, view: View) {
  const corners = [0, 1].flatMap((x) =>
    [0, 1].flatMap((y) => [0, 1].map((z) => combine(axes, [x * cells[0], y * cells[1], z * cells[2]]))),
  );
  const xs = corners.map((corner) => dot(corner, view.right));
  const ys = corners.map((corner) => -dot(corner, view.up));
  return { x: [Math.min(...xs), Math.max(...xs)], y: [Math.min(...ys), Math.max(...ys)] } as const;
}

type Flat = (point: Vector) => readonly [number, number];

/** The longest arrow in the plane: about the usual distance between atoms. */
function arrowLength({ axes: [a, b, c], cells, atoms }: MomentBox, scale: number): number {
  const inCell = Math.max(1, atoms.length / (cells[0] * cells[1] * cells[2]));
  const spacing = (Math.abs(dot(a, cross(b, c))) / inCell) ** (1 / 3);
  return Math.max(16, Math.min(longestArrow, 0.95 * spacing * scale));
}

function cellMarks({ axes, cells }: MomentBox, axis: 0 | 1 | 2, flat: Flat): string {
  const [first, second] = [nextAxis(axis), nextAxis(axis + 1)];
  const at = (x: number, y: number): Vector => plus(times(axes[first], x), axes[second], y);
  const line = (from: Vector, to: Vector) =>
    `M${flat(from).map(coordinate).join(" ")}L${flat(to).map(coordinate).join(" ")}`;
  const lines = [
    ...range(cells[first]).map((x) => line(at(x, 0), at(x, cells[second]))),
    ...range(cells[second]).map((y) => line(at(0, y), at(cells[first], y))),
  ];
  const label = (name: string, place: readonly [number, number], dx: number, dy: number) =>
    element(
      "text",
      {
        x: place[0] + dx,
        y: place[1] + dy,
        "text-anchor": "middle",
        "font-style": "italic",
        ...paint({ fill: "ink" }),
      },
      name,
    );
  return element(
    "g",
    { class: "cells" },
    element("path", { d: lines.join(""), ...paint({ stroke: "rule", fill: "none" }) }),
    label("0", flat(at(0, 0)), -14, 18),
    label(axisNames[first], flat(at(cells[first], 0)), 14, 18),
    label(axisNames[second], flat(at(0, cells[second])), -16, -8),
  );
}

function range(count: number): number[] {
  return Array.from({ length: count + 1 }, (_, index) => index);
}

/** An atom with its moment: an arrow that begins at the atom, so that atoms behind each other do not hide it. */
function atomMarks(
  site: number,
  [x, y]: readonly [number, number],
  [mx, my, towards]: readonly [number, number, number],
  { arrow, strength }: { readonly arrow: number; readonly strength: number },
): string {
  const role = seriesRole(site);
  const length = Math.hypot(mx, my);
  const whole = Math.hypot(length, towards);
  const inSight = whole > 1e-3 && Math.abs(towards) / whole > alongSight;
  const radius = inSight ? 6.5 : 4.2;
  return element(
    "g",
    { class: "atom", opacity: strength.toFixed(2) },
    whole > 1e-3 && !inSight ? arrowMarks(x, y, mx * arrow, my * arrow, site) : null,
    element("circle", {
      cx: x,
      cy: y,
      r: radius,
      "stroke-width": 1.5,
      ...(inSight ? paint({ fill: "paper", stroke: role }) : paint({ fill: role, stroke: "paper" })),
    }),
    inSight ? sightMark(x, y, towards > 0, site) : null,
  );
}

/** ⊙ to the eye, ⊗ away from it. */
function sightMark(x: number, y: number, toEye: boolean, site: number): string {
  if (toEye) return element("circle", { cx: x, cy: y, r: 2.2, ...paint({ fill: seriesRole(site) }) });
  const d = `M${coordinate(x - 3.4)} ${coordinate(y - 3.4)}l6.8 6.8m0 -6.8l-6.8 6.8`;
  return element("path", { d, "stroke-width": 1.6, ...paint({ stroke: seriesRole(site) }) });
}

function arrowMarks(x: number, y: number, dx: number, dy: number, site: number): string {
  const length = Math.hypot(dx, dy);
  const role = seriesRole(site);
  const head = Math.min(9, 0.5 * length);
  const [ux, uy] = [dx / length, dy / length];
  const tip = [x + dx, y + dy] as const;
  const foot = [tip[0] - ux * head, tip[1] - uy * head] as const;
  const half = head * 0.42;
  const corners = [tip, [foot[0] - uy * half, foot[1] + ux * half], [foot[0] + uy * half, foot[1] - ux * half]].map(
    ([px = 0, py = 0]) => `${coordinate(px)} ${coordinate(py)}`,
  );
  return [
    element("path", {
      d: `M${coordinate(x)} ${coordinate(y)}L${coordinate(foot[0])} ${coordinate(foot[1])}`,
      "stroke-width": 2.4,
      ...paint({ stroke: role }),
    }),
    element("path", { d: `M${corners.join("L")}Z`, ...paint({ fill: role }) }),
  ].join("");
}

/** What the colours of atoms mean. */
export function siteLegend(scene: Pick<MomentBox, "sites">): Figure {
  let x = 10;
  const marks = scene.sites.map((name, site) => {
    const circle = element("circle", { cx: x + 5, cy: 13, r: 5, ...paint({ fill: seriesRole(site) }) });
    const text = element("text", { x: x + 16, y: 17, ...paint({ fill: "ink" }) }, escapeMarkup(name));
    x += 16 + [...name].length * 8 + 20;
    return circle + text;
  });
  return {
    width: Math.max(60, x),
    height: 26,
    title: "Sites",
    description: "The colour of each site.",
    marks: marks.join(""),
  };
}
