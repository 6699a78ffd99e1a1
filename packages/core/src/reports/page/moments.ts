import type { MomentBox } from "../svg/moment-box.js";
import { type Role, seriesRole } from "../svg/palette.js";
import { combine, cross, dot, plus, size, times, turnedView, unit, type Vector, type View } from "../svg/space.js";
import { button, choice, make, oncePerFrame } from "./dom.js";
import { sceneParts } from "./moment-parts.js";
import type { PictureSource } from "./moment-pictures.js";
import { type Solid, solidsView } from "./solids.js";
import { turning } from "./turning.js";

/** Neither a, b nor c points to the eye. */
const atFirst = turnedView(-0.95, 0.33);
const ways = ["a", "b", "c"] as const;
const margin = 1.06;

/** A view of the moments that can be turned; made when it comes into sight, for browsers allow few of them at once. */
export function liveMoments(holder: HTMLElement, source: PictureSource): void {
  const seen = new IntersectionObserver(
    (entries) => {
      if (!entries.some(({ isIntersecting }) => isIntersecting)) return;
      seen.disconnect();
      build(holder, source);
    },
    { rootMargin: "300px" },
  );
  seen.observe(holder);
}

function build(holder: HTMLElement, source: PictureSource): void {
  if (!drawsSolids()) {
    holder.replaceChildren(
      make(
        "p",
        { class: "hint" },
        "This browser does not draw solids (WebGL): the projections below show the same moments.",
      ),
    );
    return;
  }
  const canvas = make("canvas", {
    tabindex: 0,
    role: "img",
    "aria-label": "Moments in the cell, to be turned with the arrow keys; the projections below show the same",
  });
  const labels = ["a", "b", "c"].map((name) => make("span", { class: "axis-name", "aria-hidden": "true" }, name));
  const stage = make("div", { class: "solid-stage" }, canvas, ...labels);
  const solids = solidsView(canvas);
  let scene = source.picture(source.first);
  let view = atFirst;
  let zoom = 1;
  const refill = () => solids.fill(painted(sceneParts(scene, centreOf(scene)), holder));
  const draw = oncePerFrame(() => {
    const reach = (margin * farthest(scene)) / zoom;
    solids.draw(view, reach);
    placeLabels(labels, scene, view, reach, canvas);
  });
  const turned = (right: number, down: number) => {
    view = turnedBy(view, right, down);
    draw();
  };
  const zoomed = (factor: number) => {
    zoom = Math.min(Math.max(zoom * factor, 0.5), 12);
    draw();
  };
  const look = (next: View) => {
    view = next;
    draw();
  };
  const show = (next: number) => {
    scene = source.picture(next);
    refill();
    draw();
  };
  controls(canvas, { turned, zoomed, look });
  holder.replaceChildren(
    toolBar(source, { turned, zoomed, look, along: (axis) => look(viewAlong(scene, axis)), show }),
    stage,
    siteNames(scene),
    make("p", { class: "hint" }, hint),
  );
  refill();
  new ResizeObserver(() => {
    solids.resize();
    draw();
  }).observe(stage);
  matchMedia("(prefers-color-scheme: dark)").addEventListener("change", () => {
    refill();
    draw();
  });
  solids.resize();
  draw();
}

const hint =
  "Turn it by dragging, or with the arrow keys when it has the focus; + and − change its size. Here arrows have their atoms in the middle, in the drawings below they begin at them.";

/** What can be done with the view. */
interface Actions {
  readonly turned: (right: number, down: number) => void;
  readonly zoomed: (factor: number) => void;
  readonly look: (view: View) => void;
  /** Towards the end of an axis of what is shown. */
  readonly along: (axis: 0 | 1 | 2) => void;
  readonly show: (picture: number) => void;
}

/** Mouse, touch and keys; the wheel only while the canvas has the focus, so that the page can be scrolled past it. */
function controls(
  canvas: HTMLCanvasElement,
  { turned, zoomed, look }: Pick<Actions, "turned" | "zoomed" | "look">,
): void {
  turning(canvas, turned, { "+": () => zoomed(1.25), "-": () => zoomed(0.8), Home: () => look(atFirst) });
  canvas.addEventListener(
    "wheel",
    (event) => {
      if (document.activeElement !== canvas) return;
      event.preventDefault();
      zoomed(event.deltaY < 0 ? 1.15 : 0.87);
    },
    { passive: false },
  );
}

function toolBar({ names, first }: PictureSource, { turned, zoomed, along, show }: Actions): HTMLElement {
  return make(
    "div",
    { class: "tools", role: "toolbar", "aria-label": "Moments" },
    choice("Show", names, first, show),
    button("←", "Turn to the left", () => turned(-0.25, 0)),
    button("→", "Turn to the right", () => turned(0.25, 0)),
    button("↑", "Turn up", () => turned(0, -0.25)),
    button("↓", "Turn down", () => turned(0, 0.25)),
    ...ways.map((name, axis) => button(name, `Look along ${name}`, () => along(axis as 0 | 1 | 2))),
    button("+", "Larger", () => zoomed(1.25)),
    button("−", "Smaller", () => zoomed(0.8)),
  );
}

/** A context that was only asked for to see whether there is one is given back at once. */
function drawsSolids(): boolean {
  try {
    const context = make("canvas").getContext("webgl2");
    context?.getExtension("WEBGL_lose_context")?.loseContext();
    return context !== null;
  } catch {
    return false;
  }
}

/** Of the box of cells. */
function centreOf({ axes, cells }: MomentBox): Vector {
  return times(combine(axes, cells), 0.5);
}

function farthest(box: MomentBox): number {
  const { axes, cells } = box;
  const centre = centreOf(box);
  const corners = [0, 1].flatMap((x) =>
    [0, 1].flatMap((y) => [0, 1].map((z) => [x * cells[0], y * cells[1], z * cells[2]])),
  );
  return Math.max(...corners.map((corner) => size(plus(combine(axes, corner), centre, -1))));
}

/** The view turned about its own upright and level directions. */
function turnedBy({ right, up, towards }: View, angle: number, down: number): View {
  const [c, s] = [Math.cos(angle), Math.sin(angle)];
  const level = plus(times(right, c), towards, s);
  const eye = plus(times(towards, c), right, -s);
  const [cd, sd] = [Math.cos(down), Math.sin(down)];
  const next = unit(plus(times(eye, cd), up, sd));
  const flat = unit(plus(level, next, -dot(level, next)));
  return { right: flat, up: cross(next, flat), towards: next };
}

/** From the end of an axis, as the projections are drawn. */
function viewAlong({ axes }: MomentBox, axis: 0 | 1 | 2): View {
  const towards = unit(axes[axis]);
  const level = axes[((axis + 1) % 3) as 0 | 1 | 2];
  const right = unit(plus(level, towards, -dot(level, towards)));
  return { right, up: cross(towards, right), towards };
}

type Painted = ReturnType<typeof painted>;

/** Colours of the page's scheme in place of roles. */
function painted(solids: readonly (Omit<Solid, "colour"> & { readonly role: Role })[], holder: HTMLElement): Solid[] {
  const style = getComputedStyle(holder);
  const known = new Map<Role, Vector>();
  const colourOf = (role: Role): Vector => {
    const found = known.get(role) ?? hexColour(style.getPropertyValue(`--${role}`).trim());
    known.set(role, found);
    return found;
  };
  return solids.map(({ role, ...solid }) => ({ ...solid, colour: colourOf(role) }));
}

function hexColour(text: string): Painted[number]["colour"] {
  const value = Number.parseInt(text.slice(1), 16);
  return [(value >> 16) / 255, ((value >> 8) & 255) / 255, (value & 255) / 255];
}

function placeLabels(
  labels: readonly HTMLElement[],
  box: MomentBox,
  { right, up }: View,
  reach: number,
  canvas: HTMLCanvasElement,
): void {
  const { axes, cells } = box;
  const centre = centreOf(box);
  const scale = Math.min(canvas.clientWidth, canvas.clientHeight) / 2 / reach;
  labels.forEach((label, axis) => {
    const end = times(axes[axis] as Vector, (cells[axis] ?? 1) + 0.1 * Math.max(...cells));
    const place = plus(end, centre, -1);
    label.style.left = `${canvas.clientWidth / 2 + scale * dot(place, right)}px`;
    label.style.top = `${canvas.clientHeight / 2 - scale * dot(place, up)}px`;
  });
}

function siteNames({ sites }: MomentBox): HTMLElement {
  return make(
    "ul",
    { class: "sites" },
    ...sites.map((name, site) => make("li", {}, make("span", { class: `dot ${seriesRole(site)}` }), name)),
  );
}
