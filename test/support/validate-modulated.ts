import type { ConfigurationSet, ModulatedConfiguration } from "@kvane/core/configurations";
import type { SuperspaceOperator } from "@kvane/core/magneticgroups";
import type { SiteModes } from "@kvane/core/modes";
import type { SpaceGroup } from "@kvane/core/spacegroups";
import type { Complex } from "./complex.js";
import { type Field, rankOfFields } from "./configurations-field.js";
import { evaluateText } from "./evaluate-text.js";
import {
  apply,
  componentsOf,
  determinantOf,
  type FloatGroup,
  type FloatOperator,
  floatGroup,
  inner,
  isReciprocalVector,
  latticeCoordinates,
  minus,
  plus,
  turnColumn,
  turnRow,
} from "./float-group.js";
import { type Random, seeded } from "./random.js";
import { type FloatModes, floatModes, rankOf } from "./validate-modes.js";

/** Waves of all atoms: complex amplitudes A of `M_j(x₄) = A_j e^{−2πi x₄} + c.c.`, per site 3N numbers, flat [re, im]. */
interface Wave {
  readonly real: Float64Array;
  readonly imaginary: Float64Array;
}

interface Frame {
  readonly group: FloatGroup;
  readonly k: readonly number[];
  readonly sites: readonly FloatModes[];
  readonly positions: readonly (readonly number[])[];
  /** First atom of each site in `positions`. */
  readonly starts: readonly number[];
  /** Index of an atom and the lattice vector by which a position differs from it. */
  readonly find: (site: number, position: readonly number[]) => number;
}

/** An operator with any phase shift, floats. */
interface FloatSuperspace {
  readonly operator: FloatOperator;
  readonly timeReversal: 1 | -1;
  readonly epsilon: 1 | -1;
  readonly shift: readonly number[];
  readonly delta: number;
}

/**
 * A list of incommensurate arrangements against the explicit field M_j(x₄): it is unchanged under every operator at random
 * x₄, no other operator of the parent leaves it unchanged with any phase shift, it lies in the irreps listed, and the
 * counts are those of random fields.
 */
export function modulatedProblems(
  group: SpaceGroup,
  set: ConfigurationSet,
  sites: readonly SiteModes[],
  seed: number,
): string[] {
  const random = seeded(seed);
  const frame = frameOf(group, set, sites);
  return set.modulated.flatMap((configuration) => {
    try {
      return problemsOfOne(frame, configuration, random).map(
        (problem) => `${configuration.id} ${configuration.direction}: ${problem}`,
      );
    } catch (error) {
      return [`${configuration.id}: threw ${error instanceof Error ? error.message : String(error)}`];
    }
  });
}

function frameOf(group: SpaceGroup, set: ConfigurationSet, sites: readonly SiteModes[]): Frame {
  const read = floatGroup(group);
  const floats = sites.map((site) => floatModes(group, site));
  const starts: number[] = [];
  const positions: (readonly number[])[] = [];
  for (const { positions: own } of floats) {
    starts.push(positions.length);
    positions.push(...own);
  }
  return {
    group: read,
    k: componentsOf(set.k),
    sites: floats,
    positions,
    starts,
    find: (site, position) => {
      const own = (floats[site] as FloatModes).positions;
      const index = own.findIndex((other) => latticeCoordinates(read, minus(position, other)) !== null);
      if (index < 0) throw new Error(`there is no atom at ${position}`);
      return (starts[site] as number) + index;
    },
  };
}

function floatSuperspace(operator: SuperspaceOperator): FloatSuperspace {
  return {
    operator: {
      rotation: operator.operator.rotation.map((entry) => entry / operator.operator.rotationDenominator),
      translation: operator.operator.translation.map((entry) => entry / operator.operator.translationDenominator),
    },
    timeReversal: operator.timeReversal,
    epsilon: operator.epsilon,
    shift: operator.shift.map(([top, bottom]) => top / bottom),
    delta: operator.delta[0] / operator.delta[1],
  };
}

/** M_j(x₄), three components. */
function momentAt(wave: Wave, atom: number, x4: number): number[] {
  const [cosine, sine] = [Math.cos(2 * Math.PI * x4), Math.sin(2 * Math.PI * x4)];
  return [0, 1, 2].map(
    (axis) =>
      2 * ((wave.real[3 * atom + axis] as number) * cosine + (wave.imaginary[3 * atom + axis] as number) * sine),
  );
}

function siteOf(frame: Frame, atom: number): number {
  return frame.starts.filter((start) => start <= atom).length - 1;
}

/** The wave that (R|t; θ; ε, H, δ) makes of another: `M'_{j'}(ε x₄ + H·r + δ) = θ det(R) R M_j(x₄)`. */
function movedWave(frame: Frame, wave: Wave, own: FloatSuperspace): Wave {
  const result = { real: new Float64Array(wave.real.length), imaginary: new Float64Array(wave.real.length) };
  const sign = own.timeReversal * Math.round(determinantOf(own.operator.rotation));
  frame.positions.forEach((position, atom) => {
    const target = frame.find(siteOf(frame, atom), apply(own.operator, position));
    // M' at x₄' = 0 and 1/4 gives its cosine and sine part.
    const at = (x4: number): number[] => {
      const before = own.epsilon * (x4 - inner(own.shift, position) - own.delta);
      return turnColumn(own.operator.rotation, momentAt(wave, atom, before)).map((entry) => (sign * entry) / 2);
    };
    const [cosine, sine] = [at(0), at(0.25)];
    for (let axis = 0; axis < 3; axis++) {
      result.real[3 * target + axis] = cosine[axis] as number;
      result.imaginary[3 * target + axis] = sine[axis] as number;
    }
  });
  return result;
}

function differs(a: Wave, b: Wave): boolean {
  const [left, right] = [flat(a), flat(b)];
  return left.some((entry, index) => Math.abs(entry - (right[index] as number)) > 1e-7);
}

function problemsOfOne(frame: Frame, configuration: ModulatedConfiguration, random: Random): string[] {
  const problems: string[] = [];
  const operators = configuration.superspace.operators.map(floatSuperspace);
  for (const { operator, epsilon, shift } of operators) {
    const turned = turnRow(frame.k, operator.rotation);
    if (
      turned.some(
        (entry, axis) => Math.abs(entry - epsilon * (frame.k[axis] as number) - (shift[axis] as number)) > 1e-9,
      )
    )
      problems.push("k R is not ε k + H");
    if (!isReciprocalVector(frame.group, shift)) problems.push("H is no vector of the reciprocal lattice");
  }
  const count = new Set(configuration.sites.flatMap((site) => site.amplitudes.map(({ amplitude }) => amplitude))).size;
  if (count !== configuration.freeParameters.irreps) problems.push("the amplitudes are not as many as the parameters");
  const values = Array.from({ length: count }, () => 2 * random.next() - 1);
  const wave = spreadWave(
    frame,
    configuration,
    operators,
    (site) =>
      (["cosine", "sine"] as const).map((part) =>
        [0, 1, 2].map((axis) =>
          site.amplitudes.reduce(
            (sum, share) => sum + (share[part][axis] as number) * (values[share.amplitude] as number),
            0,
          ),
        ),
      ) as [number[], number[]],
    problems,
  );
  if (wave === null) return problems;
  problems.push(...fieldProblems(frame, wave, operators, random));
  problems.push(...otherOperators(frame, wave, operators));
  problems.push(...irrepProblems(frame, wave, configuration));
  problems.push(...countProblems(frame, configuration, operators, random, problems));
  return problems;
}

/** The sites carried to all atoms by the operators. */
function spreadWave(
  frame: Frame,
  configuration: ModulatedConfiguration,
  operators: readonly FloatSuperspace[],
  amplitudesOf: (site: ModulatedConfiguration["sites"][number]) => [number[], number[]],
  problems: string[],
  tolerance = 1e-7,
): Wave | null {
  const size = 3 * frame.positions.length;
  const total = { real: new Float64Array(size).fill(Number.NaN), imaginary: new Float64Array(size).fill(Number.NaN) };
  const labels = [...new Set(configuration.sites.map(({ parentSite }) => parentSite))];
  for (const site of configuration.sites) {
    const number = labels.indexOf(site.parentSite);
    const position = site.position.map(([top, bottom]) => top / bottom);
    const atom = frame.find(number, position);
    const start = { real: new Float64Array(size), imaginary: new Float64Array(size) };
    const [cosine, sine] = amplitudesOf(site);
    for (let axis = 0; axis < 3; axis++) {
      start.real[3 * atom + axis] = (cosine[axis] as number) / 2;
      start.imaginary[3 * atom + axis] = (sine[axis] as number) / 2;
    }
    const reached = new Set<number>();
    for (const operator of operators) {
      const moved = movedWave(frame, start, operator);
      const target = frame.find(number, apply(operator.operator, position));
      reached.add(target);
      for (let axis = 3 * target; axis < 3 * target + 3; axis++)
        for (const part of ["real", "imaginary"] as const) {
          const known = total[part][axis] as number;
          if (!Number.isNaN(known) && Math.abs(known - (moved[part][axis] as number)) > tolerance)
            problems.push(`the operators give one atom of ${site.label} two waves`);
          total[part][axis] = moved[part][axis] as number;
        }
    }
    if (reached.size !== site.multiplicity) problems.push(`${site.label} stands for ${reached.size} atoms`);
  }
  if (total.real.some(Number.isNaN)) {
    problems.push("the sites do not reach every atom");
    return null;
  }
  return total;
}

/** `M_{j'}(x₄') = θ det(R) R M_j(x₄)` at random x₄, the atom shifted by a random lattice vector. */
function fieldProblems(frame: Frame, wave: Wave, operators: readonly FloatSuperspace[], random: Random): string[] {
  return operators.flatMap(({ operator, timeReversal, epsilon, shift, delta }, number) => {
    const sign = timeReversal * Math.round(determinantOf(operator.rotation));
    const wrong = frame.positions.some((position, atom) => {
      const step = frame.group.basis.reduce((sum, vector) => {
        const times = random.below(5) - 2;
        return plus(
          sum,
          vector.map((entry) => times * entry),
        );
      }, position as number[]);
      const x4 = random.next();
      const target = frame.find(siteOf(frame, atom), apply(operator, step));
      const after = momentAt(wave, target, epsilon * x4 + inner(shift, step) + delta);
      return turnColumn(operator.rotation, momentAt(wave, atom, x4)).some(
        (entry, axis) => Math.abs(sign * entry - (after[axis] as number)) > 1e-7,
      );
    });
    return wrong ? [`operator ${number} changes the field`] : [];
  });
}

/** No operator of the parent outside the list leaves the wave unchanged with any phase shift. */
function otherOperators(frame: Frame, wave: Wave, operators: readonly FloatSuperspace[]): string[] {
  return frame.group.operators.flatMap((operator) => {
    const turned = turnRow(frame.k, operator.rotation);
    const found = ([1, -1] as const).some((epsilon) => {
      const shift = turned.map((entry, axis) => entry - epsilon * (frame.k[axis] as number));
      if (!isReciprocalVector(frame.group, shift)) return false;
      const moved = movedWave(frame, wave, { operator, timeReversal: 1, epsilon, shift, delta: 0 });
      // A = e^{iφ} A' for one φ: from the largest component, then compared.
      const at = wave.real.reduce(
        (best, _, index) =>
          Math.hypot(wave.real[index] as number, wave.imaginary[index] as number) >
          Math.hypot(wave.real[best] as number, wave.imaginary[best] as number)
            ? index
            : best,
        0,
      );
      const [a, b] = [wave.real[at] as number, wave.imaginary[at] as number];
      const [c, d] = [moved.real[at] as number, moved.imaginary[at] as number];
      const size = c * c + d * d;
      if (size < 1e-12) return false;
      const [re, im] = [(a * c + b * d) / size, (b * c - a * d) / size];
      const shifted = {
        real: moved.real.map((entry, index) => re * entry - im * (moved.imaginary[index] as number)),
        imaginary: moved.imaginary.map((entry, index) => re * entry + im * (moved.real[index] as number)),
      };
      return !differs(shifted, wave);
    });
    const listed = operators.some((own) =>
      own.operator.rotation.every((entry, index) => Math.abs(entry - (operator.rotation[index] as number)) < 1e-9),
    );
    if (found === listed) return [];
    return [found ? "an operator outside the list leaves the field unchanged" : "an operator of the list does not"];
  });
}

/** S_j = A_j e^{−2πi k·r_j} lies in the span of the modes listed. */
function irrepProblems(frame: Frame, wave: Wave, configuration: ModulatedConfiguration): string[] {
  return frame.sites.flatMap((site, number) => {
    const width = 3 * site.positions.length;
    const first = 3 * (frame.starts[number] as number);
    const vector = { real: new Float64Array(width), imaginary: new Float64Array(width) };
    site.positions.forEach((position, atom) => {
      const turns = -2 * Math.PI * inner(frame.k, position);
      for (let axis = 3 * atom; axis < 3 * atom + 3; axis++) {
        const [a, b] = [wave.real[first + axis] as number, wave.imaginary[first + axis] as number];
        vector.real[axis] = a * Math.cos(turns) - b * Math.sin(turns);
        vector.imaginary[axis] = a * Math.sin(turns) + b * Math.cos(turns);
      }
    });
    if ([...vector.real, ...vector.imaginary].every((entry) => Math.abs(entry) < 1e-9)) return [];
    const own = site.modes.flatMap((list, irrep) =>
      configuration.irreps.includes(site.irreps.labels[irrep] as string) ? list : [],
    );
    return rankOf([...own, vector], width) === rankOf(own, width) ? [] : ["the field is not in the irreps listed"];
  });
}

function flat(wave: Wave): Field {
  return Float64Array.from([...wave.real, ...wave.imaginary]);
}

function countProblems(
  frame: Frame,
  configuration: ModulatedConfiguration,
  operators: readonly FloatSuperspace[],
  random: Random,
  problems: string[],
): string[] {
  const found: string[] = [];
  const size = 3 * frame.positions.length;
  const mean = (wave: Wave): Field => {
    const sum = new Float64Array(2 * size);
    for (const operator of operators)
      flat(movedWave(frame, wave, operator)).forEach((entry, index) => {
        sum[index] = (sum[index] as number) + entry;
      });
    return sum;
  };
  const noise = (): Wave => ({
    real: Float64Array.from({ length: size }, () => 2 * random.next() - 1),
    imaginary: Float64Array.from({ length: size }, () => 2 * random.next() - 1),
  });
  const { freeParameters, secondaryIrreps } = configuration;
  const ranks = (make: () => Wave, expected: number): number =>
    rankOfFields(Array.from({ length: expected + 1 }, () => mean(make())));
  const whole = ranks(noise, freeParameters.group);
  if (whole !== freeParameters.group) found.push(`the operators allow ${whole} parameters`);
  const part = ranks(() => inIrreps(frame, configuration, random), freeParameters.irreps);
  if (part !== freeParameters.irreps) found.push(`the irreps allow ${part} parameters`);
  const rest = secondaryIrreps.reduce((sum, { parameters }) => sum + parameters, 0);
  if (rest + freeParameters.irreps !== freeParameters.group) found.push("irreps and secondary irreps do not add up");
  // The forms of the operators, with random letters, are consistent too.
  let letters = 0;
  spreadWave(
    frame,
    configuration,
    operators,
    (site) => {
      const names = [...new Set(`${site.symmformCosine}${site.symmformSine}`.match(/m[xyz](?:cos|sin)/g) ?? [])];
      letters += names.length;
      const values = Object.fromEntries(names.map((name) => [name, [2 * random.next() - 1, 0] as Complex]));
      const read = (text: string): number[] =>
        text
          .slice(1, -1)
          .split(", ")
          .map((entry) => evaluateText(entry, values)[0]);
      return [read(site.symmformCosine), read(site.symmformSine)];
    },
    problems,
    // Texts with decimals have six digits.
    configuration.sites.some(({ symmformCosine, symmformSine }) => `${symmformCosine}${symmformSine}`.includes("."))
      ? 1e-4
      : 1e-7,
  );
  if (letters !== freeParameters.group) found.push("the forms have another number of letters");
  return found;
}

/** Random amplitudes of the irreps listed, as A. */
function inIrreps(frame: Frame, configuration: ModulatedConfiguration, random: Random): Wave {
  const size = 3 * frame.positions.length;
  const wave = { real: new Float64Array(size), imaginary: new Float64Array(size) };
  frame.sites.forEach((site, number) => {
    const first = 3 * (frame.starts[number] as number);
    site.modes.forEach((list, irrep) => {
      if (!configuration.irreps.includes(site.irreps.labels[irrep] as string)) return;
      for (const { real, imaginary } of list) {
        const [a, b] = [2 * random.next() - 1, 2 * random.next() - 1];
        site.positions.forEach((position, atom) => {
          const turns = 2 * Math.PI * inner(frame.k, position);
          const [re, im] = [a * Math.cos(turns) - b * Math.sin(turns), a * Math.sin(turns) + b * Math.cos(turns)];
          for (let axis = 3 * atom; axis < 3 * atom + 3; axis++) {
            wave.real[first + axis] =
              (wave.real[first + axis] as number) + re * (real[axis] as number) - im * (imaginary[axis] as number);
            wave.imaginary[first + axis] =
              (wave.imaginary[first + axis] as number) + re * (imaginary[axis] as number) + im * (real[axis] as number);
          }
        });
      }
    });
  });
  return wave;
}
