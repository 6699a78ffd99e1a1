import { atlas, type KindOfK, kindOf, star, type WaveVector } from "@kvane/core/kvectors";
import type { SpaceGroup } from "@kvane/core/spacegroups";
import {
  componentsOf,
  type FloatGroup,
  floatGroup,
  inner,
  inverse,
  minus,
  operatorsTaking,
  turnRow,
} from "./float-group.js";
import type { Random } from "./random.js";
import { randomWaveVector } from "./random-cases.js";

/** A kind of an atlas as the twin sees it. */
export interface FloatKind {
  /** A point with all letters 0, and how it moves with each letter. */
  readonly base: readonly number[];
  readonly directions: readonly (readonly number[])[];
  /** How many pairs of an operator and a sign fix a k of no special value. */
  readonly fixing: number;
  /** Lattice vectors T with `d·T = 0` for every direction d: k is on a translate by L* when `(k − base)·T` is whole. */
  readonly normals: readonly (readonly number[])[];
}

/** Entries of lattice vectors are tried up to this: enough to span the normals in conventional settings. */
const largestEntry = 3;

export function floatKind(float: FloatGroup, k: WaveVector, withInversion: boolean): FloatKind {
  const base = k.components.map((form) => form.constant[0] / form.constant[1]);
  const directions = [0, 1, 2]
    .map((letter) =>
      k.components.map((form) => (form.coefficients[letter]?.[0] ?? 0) / (form.coefficients[letter]?.[1] ?? 1)),
    )
    .filter((row) => row.some((entry) => entry !== 0));
  const entries = Array.from({ length: 2 * largestEntry + 1 }, (_, index) => index - largestEntry);
  const [a, b, c] = float.basis as [readonly number[], readonly number[], readonly number[]];
  const normals = entries
    .flatMap((l) =>
      entries.flatMap((m) => entries.map((n) => [0, 1, 2].map((i) => l * at(a, i) + m * at(b, i) + n * at(c, i)))),
    )
    .filter((vector) => directions.every((row) => Math.abs(inner(row, vector)) < 1e-9));
  return { base, directions, fixing: fixingCount(float, componentsOf(k), withInversion), normals };
}

function at(row: readonly number[], index: number): number {
  return row[index] as number;
}

function fixingCount(float: FloatGroup, k: readonly number[], withInversion: boolean): number {
  return operatorsTaking(float, k, 1).length + (withInversion ? operatorsTaking(float, k, -1).length : 0);
}

/** All ±kR⁻¹ that the classification takes together. */
export function imagesOf(float: FloatGroup, k: readonly number[], withInversion: boolean): number[][] {
  const arms = float.operators.map((operator) => turnRow(k, inverse(operator).rotation));
  return withInversion ? [...arms, ...arms.map((arm) => arm.map((entry) => -entry))] : arms;
}

/** Indices of the kinds that k belongs to: an image lies on the kind modulo L*, and no more operators fix it. */
export function kindsHolding(
  float: FloatGroup,
  kinds: readonly FloatKind[],
  k: readonly number[],
  withInversion: boolean,
): number[] {
  const fixing = fixingCount(float, k, withInversion);
  const images = imagesOf(float, k, withInversion);
  return kinds.flatMap((kind, index) => {
    if (kind.fixing !== fixing) return [];
    const holds = images.some((image) => {
      const step = minus(image, kind.base);
      return kind.normals.every((normal) => isWhole(inner(step, normal)));
    });
    return holds ? [index] : [];
  });
}

function isWhole(value: number): boolean {
  return Math.abs(value - Math.round(value)) < 1e-7;
}

/**
 * What is wrong with the atlas of a group (conventional setting) at `count` random k under each classification: every
 * other one made of small fractions, the rest on a kind taken at random, moved to another arm and by a vector of L*.
 */
export function randomKindProblems(group: SpaceGroup, random: Random, count: number): string[] {
  const float = floatGroup(group);
  return [false, true].flatMap((withInversion) => {
    const kinds = atlas(group, { withInversion });
    const floatKinds = kinds.map((kind) => floatKind(float, kind.k, withInversion));
    return Array.from({ length: count }, (_, round) => {
      const chosen = round % 2 === 0 ? null : random.below(kinds.length);
      const k = chosen === null ? randomWaveVector(group, random) : elsewhere(group, kinds[chosen] as KindOfK, random);
      const found = kindOf(group, kinds, k, { withInversion });
      const holding = kindsHolding(float, floatKinds, componentsOf(k), withInversion);
      const right = holding.length === 1 && holding[0] === found && (chosen === null || chosen === found);
      const name = `${group.name.hall} ${withInversion ? "PM" : "P"} ${JSON.stringify(k.components)}`;
      return right ? null : `${name}: made on ${chosen}, said ${found}, held by ${holding.join(" ")}`;
    }).filter((problem) => problem !== null);
  });
}

/** The form of a kind on another arm, moved by six times whole numbers, which is in L* of every conventional setting. */
function elsewhere(group: SpaceGroup, kind: KindOfK, random: Random): WaveVector {
  const arm = random.pick(star(group, kind.k).arms);
  const [a, b, c] = arm.components.map((form) => ({
    ...form,
    constant: [form.constant[0] + 6 * (random.below(5) - 2) * form.constant[1], form.constant[1]] as const,
  })) as unknown as [WaveVector["components"][0], WaveVector["components"][0], WaveVector["components"][0]];
  return { ...arm, components: [a, b, c] };
}
