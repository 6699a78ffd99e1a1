import { symbol, symbolCircle, symbolDiamond } from "d3-shape";
import { type Figure, textWidth } from "./figure.js";
import { type LabelPlaces, labelPlaces } from "./labels.js";
import { coordinate, element, escapeMarkup } from "./mark-up.js";
import { paint, type Role, seriesRole } from "./palette.js";
import { dot, plus, size, times, turnedView, type Vector, type View } from "./space.js";
import type { ZoneData } from "./zone-data.js";

/** How the zone is turned: about the upright z (∥ c*), and tipped towards the eye; radians. */
export interface ZoneTurn {
  readonly turn: number;
  readonly tip: number;
}

/** Shows three faces of a box, none of them edge on. */
export const usualTurn: ZoneTurn = { turn: 0.42, tip: 0.3 };

/** Where the name of an axis stands, over its length. */
const axisLabelAt = 1.06;

const width = 540;
const height = 470;

/** The first zone with its special points and lines and the candidates for k, by numbers that the table explains. */
export function zoneDrawing(data: ZoneData, { turn, tip }: ZoneTurn = usualTurn): Figure {
  const view = turnedView(turn, tip);
  const screen = onScreen(data, view);
  const labels = labelPlaces();
  for (const point of data.points) labels.block(...screen(placeOfLabel(point, view)), 5);
  for (const { places } of data.marks) for (const place of places) labels.block(...screen(place), 5);
  for (const { to } of data.axes) labels.block(...screen(times(to, axisLabelAt)), 8);
  // What matters most gets its label first, and is drawn last.
  const candidates = data.marks.map((mark, index) => candidateMarks(mark, index, view, screen, labels));
  const points = data.points.map((point) => pointMarks(point, view, screen, labels));
  const lines = data.lines.map((line) => lineMarks(line, screen, labels));
  const drawn = [...lines, ...points, ...candidates];
  const marks = [
    faceMarks(data, view, screen),
    axisMarks(data, screen),
    ...drawn.map(({ mark }) => mark),
    ...drawn.map(({ label }) => label),
  ];
  return {
    width,
    height,
    title: "First Brillouin zone",
    description: `The first zone with ${data.points.length} special points and ${data.lines.length} special lines, by number, and ${data.marks.length} candidates for k with all arms of their stars. The list beside it has them in words.`,
    marks: marks.join(""),
  };
}

type Screen = (point: Vector) => readonly [number, number];

/** The scale holds the zone and its axes however they are turned. */
function onScreen(data: ZoneData, view: View): Screen {
  const reach = Math.max(
    ...data.axes.map(({ to }) => size(to)),
    ...data.faces.flatMap(({ corners }) => corners.map(size)),
  );
  const scale = (Math.min(width, height) / 2 - 22) / reach;
  return (point) => [width / 2 + scale * dot(point, view.right), height / 2 - scale * dot(point, view.up)];
}

function path(points: readonly Vector[], screen: Screen, close = false): string {
  const places = points.map((point) => screen(point).map(coordinate).join(" "));
  return `M${places.join("L")}${close ? "Z" : ""}`;
}

/** Faces turned away first with broken edges, then those turned to the eye. */
function faceMarks({ faces }: ZoneData, view: View, screen: Screen): string {
  const front = (normal: Vector) => dot(normal, view.towards) > 1e-9 * size(normal);
  const face = (one: ZoneData["faces"][number], isFront: boolean) =>
    element("path", {
      d: path(one.corners, screen, true),
      "stroke-width": isFront ? 1.4 : 1,
      "stroke-dasharray": isFront ? null : "3 4",
      "fill-opacity": isFront ? 0.55 : 0,
      "stroke-linejoin": "round",
      ...paint({ fill: "panel", stroke: isFront ? "ink" : "faint" }),
    });
  return element(
    "g",
    { class: "zone-faces" },
    ...faces.filter(({ normal }) => !front(normal)).map((one) => face(one, false)),
    ...faces.filter(({ normal }) => front(normal)).map((one) => face(one, true)),
  );
}

function axisMarks({ axes }: ZoneData, screen: Screen): string {
  return element(
    "g",
    { class: "zone-axes" },
    ...axes.flatMap(({ name, to }) => {
      const label = screen(times(to, axisLabelAt));
      return [
        element("path", { d: path([[0, 0, 0], to], screen), ...paint({ stroke: "faint" }) }),
        element(
          "text",
          { x: label[0], y: label[1] + 4, "text-anchor": "middle", "font-style": "italic", ...paint({ fill: "ink" }) },
          name,
        ),
      ];
    }),
  );
}

/** A mark and its label, which stands above all marks. */
interface Marked {
  readonly mark: string;
  readonly label: string;
}

function lineMarks({ number, ends }: ZoneData["lines"][number], screen: Screen, labels: LabelPlaces): Marked {
  const text = String(number);
  // Away from the ends, where lines meet.
  const choices = [0.7, 0.6, 0.8, 0.3, 0.4, 0.2, 0.66, 0.85].flatMap((share) => {
    const [x, y] = screen(plus(times(ends[0], 1 - share), times(ends[1], share)));
    return [[x + 4, y - 4] as const, [x + 4, y + 12] as const, [x - 4 - textWidth(text, 11), y - 4] as const];
  });
  const [x, y] = labels.place(text, 11, choices);
  const d = path(ends, screen);
  return {
    mark: element("path", {
      "data-line": number,
      d,
      "stroke-width": 1.6,
      "stroke-opacity": 0.6,
      ...paint({ stroke: "accent" }),
    }),
    label: label(text, x, y, "accent", 11),
  };
}

/** All places of a special point, the one nearest to the eye with its number. */
function pointMarks(point: ZoneData["points"][number], view: View, screen: Screen, labels: LabelPlaces): Marked {
  const { number, places } = point;
  const named = placeOfLabel(point, view);
  const [x, y] = labels.place(String(number), 12, around(screen(named), String(number), 12, 6));
  return {
    mark: element(
      "g",
      { class: "zone-point", "data-point": number },
      ...places.map((place) => {
        const [cx, cy] = screen(place);
        return element("circle", { cx, cy, r: place === named ? 3.4 : 1.8, ...paint({ fill: "ink" }) });
      }),
    ),
    label: label(String(number), x, y, "ink", 12),
  };
}

/** All arms of a candidate; followed ones large and full, with their name. */
function candidateMarks(
  mark: ZoneData["marks"][number],
  index: number,
  view: View,
  screen: Screen,
  labels: LabelPlaces,
): Marked {
  const role = seriesRole(index);
  const named = placeOfLabel(mark, view);
  const letters = mark.followed ? 15 : 12;
  const [x, y] = labels.place(mark.name, letters, around(screen(named), mark.name, letters, 11));
  return {
    mark: element(
      "g",
      { class: "zone-candidate", "data-candidate": mark.name },
      mark.line === null
        ? null
        : element("path", { d: path(mark.line, screen), "stroke-width": 2.6, ...paint({ stroke: role }) }),
      ...mark.places.map((place) => candidateMark(screen(place), mark.followed, place === named, role)),
    ),
    label: label(mark.name, x, y, role, letters),
  };
}

function candidateMark([x, y]: readonly [number, number], followed: boolean, named: boolean, role: Role): string {
  return element("path", {
    d: symbol(followed ? symbolDiamond : symbolCircle, followed ? (named ? 170 : 80) : 34)() ?? "",
    transform: `translate(${coordinate(x)} ${coordinate(y)})`,
    "stroke-width": 1.6,
    ...(followed ? paint({ fill: role, stroke: "paper" }) : paint({ fill: "paper", stroke: role })),
  });
}

/** Places for a label about a mark: right above first, then the other corners, then farther away. */
function around([x, y]: readonly [number, number], text: string, letters: number, gap: number) {
  const width = textWidth(text, letters);
  const corners = (away: number) =>
    [
      [x + away, y - away],
      [x + away, y + away + 0.7 * letters],
      [x - away - width, y - away],
      [x - away - width, y + away + 0.7 * letters],
      [x - width / 2, y - 1.4 * away],
      [x - width / 2, y + 1.4 * away + 0.7 * letters],
    ] as const;
  return [...corners(gap), ...corners(2 * gap)];
}

/**
 * Of the places of ±k as it is written, so that the label stands where the list says, the one most to the front; of
 * several the one most to the right, then the lowest.
 */
function placeOfLabel({ places, own }: ZoneData["points"][number] | ZoneData["marks"][number], view: View): Vector {
  const { towards, right, up } = view;
  const key = (place: Vector) => dot(place, towards) + 1e-3 * dot(place, right) - 1e-4 * dot(place, up);
  return places.slice(0, own).reduce((best, place) => (key(place) > key(best) + 1e-9 ? place : best));
}

/** A text that stays legible on lines. */
function label(text: string, x: number, y: number, role: Role, letters: number): string {
  const place = { x, y, "font-size": letters, "font-weight": 600 };
  const halo = { "stroke-width": 3.5, "stroke-linejoin": "round", "aria-hidden": "true" };
  return [
    element("text", { ...place, ...halo, ...paint({ fill: "paper", stroke: "paper" }) }, escapeMarkup(text)),
    element("text", { ...place, ...paint({ fill: role }) }, escapeMarkup(text)),
  ].join("");
}
