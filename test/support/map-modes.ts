import { smallIrreps } from "@kvane/core/irreps";
import type { WaveVector } from "@kvane/core/kvectors";
import { siteModes } from "@kvane/core/modes";
import { type BasisChange, changeBasis, type Site, type SpaceGroup, siteOrbit } from "@kvane/core/spacegroups";
import { invert, subtractVectors, timesColumn } from "#core/numbers/index.js";
import { componentsOf, floatGroup, inner, latticeCoordinates } from "./float-group.js";
import { carriedWave } from "./random-bases.js";
import { type Field, floatModes, rankOf } from "./validate-modes.js";

/**
 * The same site and k in other axes: each irrep's modes, carried over by hand, must span the modes of exactly one irrep
 * of the new setting, of the same dimension, reality and multiplicity.
 *
 * Atom r_j at x' = P⁻¹(r_j − p) is atom j' of the new orbit, shifted by a' ∈ L'; its moment m' = P⁻¹m stands there, so
 * `S'_{j'} = P⁻¹ S_j e^{+2πi k'·a'}` (docs/conventions.md).
 *
 * @param sign −1 takes the wrong sign of that phase, which must be noticed
 */
export function mappedModesProblems(
  group: SpaceGroup,
  k: WaveVector,
  site: Site,
  change: BasisChange,
  sign: 1 | -1 = 1,
): string[] {
  const changed = changeBasis(group, change);
  const back = invert(change.matrix);
  const moved: Site = { label: site.label, position: timesColumn(back, subtractVectors(site.position, change.shift)) };
  const newK = carriedWave(k, change);
  const [old, fresh] = [
    [group, k, site],
    [changed, newK, moved],
  ].map(([inGroup, wave, at]) => {
    const irreps = smallIrreps(inGroup as SpaceGroup, wave as WaveVector);
    const modes = siteModes(inGroup as SpaceGroup, irreps, siteOrbit(inGroup as SpaceGroup, at as Site, null));
    return { irreps: irreps.irreps, read: floatModes(inGroup as SpaceGroup, modes) };
  }) as unknown as [Side, Side];
  const turn = back.map((row) => row.map(([top, bottom]) => top / bottom));
  const origin = change.shift.map(([top, bottom]) => top / bottom);
  const float = floatGroup(changed);
  const wave = componentsOf(newK);
  const places = old.read.positions.map((position) => {
    const there = turned(
      turn,
      position.map((entry, axis) => entry - (origin[axis] as number)),
    );
    for (const [target, other] of fresh.read.positions.entries()) {
      const shift = there.map((entry, axis) => entry - (other[axis] as number));
      if (latticeCoordinates(float, shift) !== null) return { target, angle: sign * 2 * Math.PI * inner(wave, shift) };
    }
    throw new Error("an atom is not on the orbit of the new setting");
  });
  const size = 3 * places.length;
  const taken = new Set<number>();
  return old.irreps.flatMap((irrep, index) => {
    const mapped = (old.read.modes[index] ?? []).map((mode) => carried(mode, turn, places, size));
    const partner = fresh.irreps.findIndex((other, position) => {
      const own = fresh.read.modes[position] ?? [];
      if (taken.has(position) || other.dimension !== irrep.dimension || other.reality !== irrep.reality) return false;
      return own.length === mapped.length && rankOf([...own, ...mapped], size) === own.length;
    });
    taken.add(partner);
    return partner < 0 ? [`${irrep.label}: no irrep of the new setting has its modes`] : [];
  });
}

interface Side {
  readonly irreps: readonly { readonly label: string; readonly dimension: number; readonly reality: string }[];
  readonly read: ReturnType<typeof floatModes>;
}

function turned(matrix: readonly (readonly number[])[], column: readonly number[]): number[] {
  return matrix.map((row) => inner(row, column));
}

function carried(
  mode: Field,
  turn: readonly (readonly number[])[],
  places: readonly { readonly target: number; readonly angle: number }[],
  size: number,
): Field {
  const real = new Float64Array(size);
  const imaginary = new Float64Array(size);
  places.forEach(({ target, angle }, atom) => {
    const re = turned(turn, [...mode.real.subarray(3 * atom, 3 * atom + 3)]);
    const im = turned(turn, [...mode.imaginary.subarray(3 * atom, 3 * atom + 3)]);
    const [cosine, sine] = [Math.cos(angle), Math.sin(angle)];
    for (let axis = 0; axis < 3; axis++) {
      real[3 * target + axis] = (re[axis] as number) * cosine - (im[axis] as number) * sine;
      imaginary[3 * target + axis] = (re[axis] as number) * sine + (im[axis] as number) * cosine;
    }
  });
  return { real, imaginary };
}
