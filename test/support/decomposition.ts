import { smallIrreps } from "@kvane/core/irreps";
import type { WaveVector } from "@kvane/core/kvectors";
import { type SiteModes, siteModes } from "@kvane/core/modes";
import { siteOrbit } from "@kvane/core/spacegroups";
import { latticeCoordinates, minus } from "./float-group.js";
import { groupOf } from "./parsed-groups.js";
import { type FloatMode, floatModes, rankOf } from "./validate-modes.js";
import { site, wave } from "./written.js";

/** Modes of a site, everything given as text. */
export function modesOf(group: string, k: string | WaveVector, position: string): SiteModes {
  const parsed = groupOf(group);
  const irreps = smallIrreps(parsed, typeof k === "string" ? wave(k) : k);
  return siteModes(parsed, irreps, siteOrbit(parsed, site("M", position), null));
}

/** `dimension x multiplicity` of the irreps that occur on the whole orbit, sorted: `["1x1", "1x1", "2x2"]`. */
export function decomposition(modes: SiteModes): string[] {
  return modes.irreps
    .filter((entry) => entry.multiplicity > 0)
    .map((entry) => `${entry.irrep.dimension}x${entry.multiplicity}`)
    .sort();
}

/** The same for each suborbit of the little group: the number of atoms, then the list. */
export function decompositionsBySuborbit(modes: SiteModes): string[] {
  return modes.suborbits
    .map((atoms, suborbit) => {
      const counts = modes.irreps
        .map(({ irrep, modes: list }) => ({
          dimension: irrep.dimension,
          multiplicity: list.filter((mode) => mode.suborbit === suborbit).length / irrep.dimension,
        }))
        .filter(({ multiplicity }) => multiplicity > 0)
        .map(({ dimension, multiplicity }) => `${dimension}x${multiplicity}`);
      return `${atoms.length} atoms: ${counts.sort().join(" ")}`;
    })
    .sort();
}

/** `1x1*4 2x2*2` written out and sorted. */
export function list(text: string): string[] {
  return text
    .split(" ")
    .flatMap((entry) => {
      const [part = "", times = "1"] = entry.split("*");
      return new Array<string>(Number(times)).fill(part);
    })
    .sort();
}

/** A vector of 3N real components over the atoms of the orbit. */
export function realVector(components: readonly (readonly number[])[]): Pick<FloatMode, "real" | "imaginary"> {
  const flat = components.flat();
  return { real: Float64Array.from(flat), imaginary: new Float64Array(flat.length) };
}

/** Labels of the irreps whose modes span the vector: one label for a vector of a single irrep, else none. */
export function irrepsHolding(
  group: string,
  modes: SiteModes,
  vector: Pick<FloatMode, "real" | "imaginary">,
): string[] {
  const read = floatModes(groupOf(group), modes);
  const size = 3 * read.positions.length;
  return read.modes.flatMap((own, irrep) =>
    own.length > 0 && rankOf([...own, vector], size) === rankOf(own, size) ? [read.irreps.labels[irrep] as string] : [],
  );
}

/** Signs of one component on the atoms at the given positions, as a vector over the orbit; other atoms carry nothing. */
export function patternVector(
  group: string,
  modes: SiteModes,
  atoms: readonly string[],
  moments: readonly (readonly number[])[],
): Pick<FloatMode, "real" | "imaginary"> {
  const read = floatModes(groupOf(group), modes);
  const components = read.positions.map(() => [0, 0, 0] as readonly number[]);
  atoms.forEach((text, at) => {
    const wanted = site("M", text).position.map(([top, bottom]) => top / bottom);
    const index = read.positions.findIndex((own) => latticeCoordinates(read.irreps.group, minus(own, wanted)) !== null);
    if (index < 0) throw new Error(`there is no atom at ${text}`);
    components[index] = moments[at] as readonly number[];
  });
  return realVector(components);
}
