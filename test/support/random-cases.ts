import type { WaveVector } from "@kvane/core/kvectors";
import { exactWaveVector } from "@kvane/core/kvectors";
import type { Site, SpaceGroup } from "@kvane/core/spacegroups";
import { compose, type FloatGroup, type FloatOperator, floatGroup, plus, turnRow } from "./float-group.js";
import type { Random } from "./random.js";
import { reduced } from "./written.js";

/** Everything random here has this denominator or a divisor of it before letters are scaled. */
const grain = 60;

/** Turns a float that is a whole number of 1/denominator into a fraction. */
function asFraction(value: number, denominator: number): [number, number] {
  const top = Math.round(value * denominator);
  if (Math.abs(top - value * denominator) > 1e-6) throw new Error(`${value} is no multiple of 1/${denominator}`);
  return reduced(top, denominator);
}

const smallFractions = [0, 0, 0, 1 / 2, 1 / 2, -1 / 2, 1, 1 / 3, 2 / 3, -1 / 3, 1 / 4, -3 / 4];
const steps = [1 / 5, -2 / 5, 1 / 3, 1 / 4, 1 / 6, 3 / 2, -1 / 2];

/**
 * A rational k made of small fractions: a point plus, three times in four, a step along rows that a random rotation R
 * leaves fixed (sums over the powers of R), so that points, lines, planes and general positions all come up.
 */
export function randomWaveVector(group: SpaceGroup, random: Random): WaveVector {
  const { operators } = floatGroup(group);
  let k = [random.pick(smallFractions), random.pick(smallFractions), random.pick(smallFractions)];
  for (let times = random.below(4); times > 0; times--) {
    const rotation = (random.pick(operators) as FloatOperator).rotation;
    const direction = fixedRow(rotation, random);
    const step = random.pick(steps);
    k = plus(
      k,
      direction.map((entry) => entry * step),
    );
  }
  const [a, b, c] = k.map((entry) => asFraction(entry, grain)) as [Pair, Pair, Pair];
  return exactWaveVector([a, b, c]);
}

type Pair = [number, number];

/** Σ_n w Rⁿ for a small random row w, divided by the common factor of its entries. */
function fixedRow(rotation: readonly number[], random: Random): number[] {
  const start = [random.below(3) - 1, random.below(3) - 1, random.below(3) - 1];
  let sum = [0, 0, 0];
  let row = start;
  for (let power = 0; power < 12; power++) {
    sum = plus(sum, row);
    row = turnRow(row, rotation);
  }
  const whole = sum.map(Math.round);
  const divisor = whole.reduce((a, b) => {
    let [x, y] = [Math.abs(a), Math.abs(b)];
    while (y !== 0) [x, y] = [y, x % y];
    return x;
  }, 0);
  return whole.map((entry) => (divisor === 0 ? 0 : entry / divisor + 0));
}

/** Three coordinates without any relation. */
export function generalSite(random: Random): Site {
  const coordinate = (): Pair => reduced(31 + random.below(420), 997);
  return { label: "G", position: [coordinate(), coordinate(), coordinate()] };
}

/**
 * A site that some operators leave alone: the mean of a start position over the powers of a random operator of finite
 * order, `x, gx, g²x, …`; the start is often made of small fractions, so that points, axes and planes come up.
 */
export function specialSite(group: SpaceGroup, random: Random): Site {
  const read = floatGroup(group);
  const generator = finiteOperator(read, random);
  const coordinate = (): number => random.pick([0, 0, 1 / 2, 1 / 4, 1 / 3, 2 / 3, 1 / 8, 137 / 1000]);
  const start = [coordinate(), coordinate(), coordinate()];
  let sum = [0, 0, 0];
  let power: FloatOperator = { rotation: [1, 0, 0, 0, 1, 0, 0, 0, 1], translation: [0, 0, 0] };
  let order = 0;
  do {
    sum = plus(sum, plus(turnColumnBy(power, start), power.translation));
    power = compose(power, generator);
    order += 1;
  } while (!isUnit(power.rotation));
  const position = sum.map((entry) => asFraction(entry / order, 864_000)) as [Pair, Pair, Pair];
  return { label: "S", position };
}

function turnColumnBy(operator: FloatOperator, x: readonly number[]): number[] {
  return [0, 3, 6].map((row) =>
    [0, 1, 2].reduce((sum, axis) => sum + (operator.rotation[row + axis] as number) * (x[axis] as number), 0),
  );
}

function isUnit(rotation: readonly number[]): boolean {
  return rotation.every((entry, index) => Math.abs(entry - (index % 4 === 0 ? 1 : 0)) < 1e-9);
}

/** An operator with no translation left in its powers, found among random ones; the identity when none comes up. */
function finiteOperator(group: FloatGroup, random: Random): FloatOperator {
  for (let tries = 0; tries < 12; tries++) {
    const operator = random.pick(group.operators);
    const shift = group.basis.map((vector) => vector.map((entry) => entry * (random.below(3) - 1)));
    const candidate = {
      ...operator,
      translation: shift.reduce((sum, vector) => plus(sum, vector), [...operator.translation]),
    };
    let power: FloatOperator = candidate;
    while (!isUnit(power.rotation)) power = compose(power, candidate);
    if (!isUnit(candidate.rotation) && power.translation.every((entry) => Math.abs(entry) < 1e-9)) return candidate;
  }
  return group.operators[0] as FloatOperator;
}
