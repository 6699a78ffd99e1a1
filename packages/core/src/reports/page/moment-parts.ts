import type { MomentBox, MomentPicture } from "../svg/moment-box.js";
import { type Role, seriesRole } from "../svg/palette.js";
import { combine, cross, dot, plus, size, times, type Vector } from "../svg/space.js";
import type { Solid } from "./solids.js";

/** A solid with the role of its colour. */
type RoleSolid = Omit<Solid, "colour"> & { readonly role: Role };

/** Everything that stands in the view of one picture, about the centre of the cells; lengths in Å. */
export function sceneParts(scene: MomentPicture, centre: Vector): RoleSolid[] {
  const { vectors } = scene;
  const spacing = usualSpacing(scene);
  const atoms = scene.atoms.flatMap(({ site, at }, index) => {
    const place = plus(combine(scene.axes, at), centre, -1);
    return [
      ball(place, 0.09 * spacing, seriesRole(site)),
      ...arrow(place, vectors[index] as Vector, spacing, seriesRole(site)),
    ];
  });
  return [...cellEdges(scene, centre, 0.012 * spacing), ...atoms];
}

/** Å: the edge of the cube that one atom has for itself. */
function usualSpacing({ axes: [a, b, c], cells, atoms }: MomentBox): number {
  const volume = Math.abs(dot(a, cross(b, c))) * cells[0] * cells[1] * cells[2];
  // Without those that are drawn again on the far sides.
  const inside = atoms.filter(({ at }) => at.every((entry, axis) => entry < (cells[axis] as number) - 1e-4)).length;
  return (volume / Math.max(1, inside)) ** (1 / 3);
}

function ball(centre: Vector, radius: number, role: Role): RoleSolid {
  return { shape: "ball", centre, along: [0, radius, 0], radius, role };
}

function stick(from: Vector, to: Vector, radius: number, role: Role, shape: "stick" | "cone" = "stick"): RoleSolid {
  return { shape, centre: times(plus(from, to), 0.5), along: plus(to, from, -1), radius, role };
}

/** Through the middle of its atom. */
function arrow(place: Vector, moment: Vector, spacing: number, role: Role): RoleSolid[] {
  const length = size(moment);
  if (length < 1e-3) return [];
  const half = times(moment, 0.46 * spacing);
  const tip = plus(place, half);
  const head = Math.min(0.26 * spacing, 0.6 * length * spacing);
  const neck = plus(tip, moment, -head / length);
  return [stick(plus(place, half, -1), neck, 0.045 * spacing, role), stick(neck, tip, 0.115 * spacing, role, "cone")];
}

function cellEdges({ axes, cells }: MomentBox, centre: Vector, radius: number): RoleSolid[] {
  const range = (count: number) => Array.from({ length: count + 1 }, (_, index) => index);
  return ([0, 1, 2] as const).flatMap((axis) => {
    const [second, third] = [((axis + 1) % 3) as 0 | 1 | 2, ((axis + 2) % 3) as 0 | 1 | 2];
    return range(cells[second]).flatMap((y) =>
      range(cells[third]).map((z) => {
        const from = plus(plus(times(axes[second], y), axes[third], z), centre, -1);
        const outer = y === 0 && z === 0;
        return stick(from, plus(from, axes[axis], cells[axis]), outer ? 2 * radius : radius, "faint");
      }),
    );
  });
}
