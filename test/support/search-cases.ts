import { atlas, type KindOfK, numericWaveVector, usedParameters, type WaveVector } from "@kvane/core/kvectors";
import type { PeakList, Region, SearchResult } from "@kvane/core/search";
import type { Cell, SpaceGroup } from "@kvane/core/spacegroups";
import { lengthOf, reciprocalAxes, twinLines } from "./line-twin.ts";
import { groupOf } from "./parsed-groups.ts";
import { angleList, normal } from "./peak-lists.ts";
import { type Random, seeded } from "./random.ts";
import { randomCell } from "./random-cells.ts";

/** One made peak list with the k behind it. */
export interface SearchCase {
  readonly name: string;
  readonly group: SpaceGroup;
  readonly cell: Cell;
  readonly centring: readonly Triple[];
  readonly k: Triple;
  readonly dimension: number;
  readonly list: PeakList;
  /** Largest half-width of a match, Å⁻¹. */
  readonly tolerance: number;
}

export type Triple = readonly [number, number, number];

/** Space-group numbers of every crystal system and lattice, low and high Laue classes. */
const numbers = [
  1, 2, 4, 5, 9, 14, 15, 19, 33, 36, 43, 62, 63, 70, 72, 75, 82, 88, 113, 129, 139, 146, 148, 155, 161, 163, 166, 173,
  176, 186, 191, 198, 205, 206, 217, 220, 221, 225, 227, 229,
] as const;

const centrings: Readonly<Record<string, readonly Triple[]>> = {
  P: [],
  A: [[0, 0.5, 0.5]],
  C: [[0.5, 0.5, 0]],
  I: [[0.5, 0.5, 0.5]],
  F: [
    [0, 0.5, 0.5],
    [0.5, 0, 0.5],
    [0.5, 0.5, 0],
  ],
  R: [
    [2 / 3, 1 / 3, 1 / 3],
    [1 / 3, 2 / 3, 2 / 3],
  ],
};

export interface CaseOptions {
  readonly least: number;
  readonly most: number;
  /** Stray peaks at random. */
  readonly strays: number;
  /** Share of lines that are seen. */
  readonly seen: number;
  readonly volumes: readonly [number, number];
  /** Degrees 2θ. */
  readonly uncertainty: number;
  readonly zeroShift?: number;
}

const wavelength = 2.41;

/**
 * A made list: lines of a random k of a random kind, counted in the slow way of `line-twin`, at λ = 2.41 Å with normal
 * noise cut at 2.7 s.u.; a share of them missing; lines that overlap seen as the lowest of them.
 */
export function searchCase(seed: number, options: CaseOptions): SearchCase {
  const random = seeded(seed);
  for (;;) {
    const number = random.pick(numbers);
    const group = groupOf(number);
    const letter = group.name.hermannMauguin?.charAt(0) ?? "P";
    const centring = centrings[letter];
    if (centring === undefined) continue;
    const [low, high] = options.volumes;
    const cell = randomCell(group, random, low * (high / low) ** random.next());
    const kind = pickKind(atlas(group, { withInversion: true }), random);
    const values = usedParameters(kind.k).map(() => random.next() - 0.5);
    const k = numericWaveVector({ ...kind.k, values, uncertainties: values.map(() => null) }) as Triple;
    const count = options.least + random.below(options.most - options.least + 1);
    const angles = seenAngles(cell, centring, k, count, options, random);
    if (angles === null) continue;
    const shifted = angles.map((angle) => angle + (options.zeroShift ?? 0));
    const list = angleList(shifted, options.uncertainty, wavelength);
    const tolerance = 3 * Math.max(...list.peaks.map(({ uncertainty }) => uncertainty as number));
    const name = `seed ${seed}: group ${number}, k ${k.map((entry) => entry.toFixed(4)).join(" ")}, ${count} lines`;
    return { name, group, cell, centring, k, dimension: kind.dimensionPM, list, tolerance };
  }
}

function pickKind(kinds: readonly KindOfK[], random: Random): KindOfK {
  const dimension = random.pick([...new Set(kinds.map(({ dimensionPM }) => dimensionPM))]);
  return random.pick(kinds.filter(({ dimensionPM }) => dimensionPM === dimension));
}

function seenAngles(
  cell: Cell,
  centring: readonly Triple[],
  k: Triple,
  count: number,
  options: CaseOptions,
  random: Random,
): number[] | null {
  const limit = (4 * Math.PI * 0.9) / wavelength;
  const angleOf = (q: number): number => (360 / Math.PI) * Math.asin((q * wavelength) / (4 * Math.PI));
  const angles: number[] = [];
  for (let qMax = 1.2; angles.length < count; qMax *= 1.4) {
    if (qMax > 1.5 * limit) return null;
    angles.length = 0;
    let last = 0;
    for (const { q } of twinLines(cell, centring, [k], Math.min(qMax, limit))) {
      const angle = angleOf(q);
      if (q < 0.15 || angle - last < 6 * options.uncertainty) continue;
      last = angle;
      if (random.next() > options.seen) continue;
      angles.push(angle + options.uncertainty * Math.max(-2.7, Math.min(2.7, normal(random))));
      if (angles.length === count) break;
    }
  }
  const highest = angles.at(-1) as number;
  for (let stray = 0; stray < options.strays; stray++) angles.push(5 + (highest - 5) * random.next());
  return angles.sort((a, b) => a - b);
}

/** All images of k under the point group extended by −1, before vectors of L* are added. */
function imagesOf(group: SpaceGroup, k: Triple): Triple[] {
  return group.operators.flatMap(({ rotation, rotationDenominator }) => {
    const image = [0, 1, 2].map(
      (column) =>
        (k[0] * (rotation[column] as number) +
          k[1] * (rotation[3 + column] as number) +
          k[2] * (rotation[6 + column] as number)) /
        rotationDenominator,
    );
    return [image, image.map((entry) => -entry)] as unknown as Triple[];
  });
}

function isWhole(value: number): boolean {
  return Math.abs(value - Math.round(value)) < 1e-9;
}

/** Vectors of L* with components from −reach to reach. */
function latticeVectors(centring: readonly Triple[], reach: number): Triple[] {
  const list: Triple[] = [];
  for (let h = -reach; h <= reach; h++)
    for (let k = -reach; k <= reach; k++)
      for (let l = -reach; l <= reach; l++)
        if (centring.every((t) => isWhole(h * t[0] + k * t[1] + l * t[2]))) list.push([h, k, l]);
  return list;
}

/** Distance in Å⁻¹ between two k, all images allowed, the slow way. */
export function slowStarDistance(
  group: SpaceGroup,
  cell: Cell,
  centring: readonly Triple[],
  a: Triple,
  b: Triple,
): number {
  const axes = reciprocalAxes(cell);
  const vectors = latticeVectors(centring, 4);
  let least = Number.POSITIVE_INFINITY;
  for (const image of imagesOf(group, a))
    for (const h of vectors)
      least = Math.min(
        least,
        lengthOf(
          axes,
          [0, 1, 2].map((i) => (image[i] as number) + (h[i] as number) - (b[i] as number)),
        ),
      );
  return least;
}

/** Whether some image of k lies within the bounds of a region of a kind of the given dimension. */
export function inSomeRegion(
  { group, centring, k }: Pick<SearchCase, "group" | "centring" | "k">,
  regions: readonly Region[],
  dimension: number,
): boolean {
  const images = imagesOf(group, k);
  const vectors = latticeVectors(centring, 4);
  const wanted = regions.filter(({ from }) => from.length === dimension);
  return wanted.some((region) =>
    images.some((image) => vectors.some((h) => inRegion(region, [image[0] + h[0], image[1] + h[1], image[2] + h[2]]))),
  );
}

const rounding = 1e-7;

function inRegion({ kind, from, to }: Region, k: Triple): boolean {
  const letters = lettersOf(kind, k);
  if (letters === null) return false;
  return letters.every(
    (value, index) => value >= (from[index] as number) - rounding && value <= (to[index] as number) + rounding,
  );
}

/** The letters of a form at k, each from a component that holds it alone; null when k is not on the form. */
function lettersOf(form: WaveVector, k: Triple): number[] | null {
  const used = usedParameters(form);
  const constants = form.components.map(({ constant }) => constant[0] / constant[1]);
  const coefficient = (axis: number, letter: number): number => {
    const [n, d] = (form.components[axis] as WaveVector["components"][0]).coefficients[letter as 0 | 1 | 2];
    return n / d;
  };
  const letters = used.map((letter) => {
    const axis = [0, 1, 2].find(
      (place) =>
        coefficient(place, letter) !== 0 && used.every((other) => other === letter || coefficient(place, other) === 0),
    );
    if (axis === undefined) throw new Error("a form has no component with one letter alone");
    return ((k[axis] as number) - (constants[axis] as number)) / coefficient(axis, letter);
  });
  const back = constants.map((constant, axis) =>
    used.reduce((sum, letter, index) => sum + coefficient(axis, letter) * (letters[index] as number), constant),
  );
  return back.every((entry, axis) => Math.abs(entry - (k[axis] as number)) < 1e-6) ? letters : null;
}

/** Whether the first candidate, or one tied with it, is the k that the list was made from. */
export function ranksFirst(made: SearchCase, result: SearchResult): boolean {
  const [first] = result.candidates;
  if (first === undefined) return false;
  return [first, ...first.tiedWith.map((index) => result.candidates[index])].some(
    (candidate) =>
      candidate !== undefined &&
      slowStarDistance(made.group, made.cell, made.centring, numericWaveVector(candidate.k) as Triple, made.k) <
        4 * made.tolerance,
  );
}
