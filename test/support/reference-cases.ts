import { readFileSync } from "node:fs";
import { type SmallIrreps, smallIrreps } from "@kvane/core/irreps";
import { siteModes } from "@kvane/core/modes";
import { siteOrbit } from "@kvane/core/spacegroups";
import { inner, latticeCoordinates, minus, reduce } from "./float-group.js";
import { type FloatIrreps, floatIrreps } from "./float-irreps.js";
import { groupOf } from "./parsed-groups.js";
import { site, tripletNumbers, wave } from "./written.js";

interface ReferenceIrrep {
  readonly dimension: number;
  readonly reality: string;
  readonly characters: readonly (readonly [number, number])[];
}

/** One line of `characters.jsonl`. */
export interface CharacterCase {
  readonly number: number;
  readonly k: readonly string[];
  readonly order: number;
  readonly star: number;
  readonly minusK: string;
  readonly reps: readonly string[];
  readonly irreps: readonly ReferenceIrrep[];
}

/** One line of `decompositions.jsonl`. */
export interface DecompositionCase {
  readonly number: number;
  readonly k: readonly string[];
  readonly reps: readonly string[];
  readonly irreps: readonly ReferenceIrrep[];
  readonly sites: readonly {
    readonly position: readonly string[];
    readonly orbit: readonly (readonly string[])[];
    readonly multiplicities: readonly number[];
  }[];
}

const tolerance = 1e-9;

export function readCases<Case>(name: string): Case[] {
  const text = readFileSync(new URL(`../fixtures/${name}`, import.meta.url), "utf8");
  return text
    .split("\n")
    .filter((line) => line !== "")
    .map((line) => JSON.parse(line) as Case);
}

export function characterCaseProblems(entry: CharacterCase): string[] {
  const group = groupOf(entry.number);
  const irreps = smallIrreps(group, wave(entry.k.join(" ")));
  const name = `${entry.number} (${entry.k.join(",")})`;
  const problems: string[] = [];
  if (irreps.minusK !== entry.minusK) problems.push(`${name}: −k ${irreps.minusK}, expected ${entry.minusK}`);
  if (irreps.arms !== entry.star) problems.push(`${name}: ${irreps.arms} arms, expected ${entry.star}`);
  if (irreps.littleGroup.operators.length !== entry.order)
    problems.push(`${name}: order ${irreps.littleGroup.operators.length}, expected ${entry.order}`);
  else if (matchIrreps(floatIrreps(group, irreps), irreps, entry) === null)
    problems.push(`${name}: the sets of characters, dimensions and realities differ`);
  return problems;
}

/** For each irrep of the reference the index of ours with the same characters at the same operators, or null. */
function matchIrreps(
  read: FloatIrreps,
  irreps: SmallIrreps,
  reference: Pick<CharacterCase, "reps" | "irreps">,
): number[] | null {
  const ours = charactersAt(read, reference.reps);
  const free = new Set(ours.keys());
  const found = reference.irreps.map((wanted) => {
    for (const index of free) {
      const same = (ours[index] ?? []).every(([re, im], at) => {
        const [x, y] = wanted.characters[at] as readonly [number, number];
        return Math.hypot(re - x, im - y) < tolerance;
      });
      const irrep = irreps.irreps[index];
      if (same && irrep?.dimension === wanted.dimension && irrep.reality === wanted.reality) {
        free.delete(index);
        return index;
      }
    }
    return -1;
  });
  return found.includes(-1) || free.size > 0 ? null : found;
}

/** Characters of every irrep at the operators that are written, which may differ from ours by lattice translations. */
function charactersAt(read: FloatIrreps, triplets: readonly string[]): [number, number][][] {
  const places = triplets.map((text) => {
    const { index, shift } = reduce(read.group, tripletNumbers(text));
    return { at: read.operators.indexOf(index), angle: 2 * Math.PI * inner(read.k, shift) };
  });
  return read.characters.map((characters) =>
    places.map(({ at, angle }) => {
      const [re, im] = characters[at] ?? [Number.NaN, Number.NaN];
      return [re * Math.cos(angle) - im * Math.sin(angle), re * Math.sin(angle) + im * Math.cos(angle)];
    }),
  );
}

export function decompositionCaseProblems(entry: DecompositionCase): string[] {
  const group = groupOf(entry.number);
  const irreps = smallIrreps(group, wave(entry.k.join(" ")));
  const read = floatIrreps(group, irreps);
  const name = `${entry.number} (${entry.k.join(",")})`;
  const matched = matchIrreps(read, irreps, entry);
  if (matched === null) return [`${name}: the sets of characters differ`];
  return entry.sites.flatMap((wanted) => {
    const orbit = siteOrbit(group, site("M", wanted.position.join(" ")), null);
    const modes = siteModes(group, irreps, orbit);
    const where = `${name} at (${wanted.position.join(",")})`;
    const problems: string[] = [];
    const multiplicities = matched.map((index) => modes.irreps[index]?.multiplicity);
    if (multiplicities.join() !== wanted.multiplicities.join())
      problems.push(`${where}: multiplicities ${multiplicities.join()}, expected ${wanted.multiplicities.join()}`);
    if (!sameOrbit(read, orbit.positions, wanted.orbit)) problems.push(`${where}: another orbit`);
    return problems;
  });
}

function sameOrbit(
  read: FloatIrreps,
  positions: readonly (readonly (readonly [number, number])[])[],
  wanted: readonly (readonly string[])[],
): boolean {
  const ours = positions.map((position) => position.map(([top, bottom]) => top / bottom));
  const theirs = wanted.map((position) =>
    position.map((text) => {
      const [top, bottom = "1"] = text.split("/");
      return Number(top) / Number(bottom);
    }),
  );
  return (
    ours.length === theirs.length &&
    theirs.every((position) => ours.some((own) => latticeCoordinates(read.group, minus(own, position)) !== null))
  );
}
