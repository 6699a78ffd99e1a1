import type { Configuration, ConfigurationSet } from "@kvane/core/configurations";
import type { SiteModes } from "@kvane/core/modes";
import type { SpaceGroup, SymmetryOperator } from "@kvane/core/spacegroups";
import {
  carriedComponents,
  differenceOf,
  type Field,
  type FourierVector,
  fourierComponents,
  type GreyOperator,
  greyOperators,
  isUnchanged,
  meanOver,
  randomIrrepField,
  rankOfFields,
  type Supercell,
  supercell,
} from "./configurations-field.js";
import { evaluateText } from "./evaluate-text.js";
import {
  componentsOf,
  type FloatOperator,
  inner,
  inverse,
  isReciprocalVector,
  minus,
  turnColumn,
  turnRow,
} from "./float-group.js";
import { type Random, seeded } from "./random.js";
import { rankOf } from "./validate-modes.js";

export interface ConfigurationCheck {
  readonly seed: number;
  /** Atoms of the cell of a configuration above which counts by random fields are left out. */
  readonly mostAtoms: number;
  /** Configurations looked at, a seeded choice where there are more. */
  readonly most: number;
}

/**
 * Every statement of a list of configurations against explicit fields: operators × centrings on the sites give one
 * moment per atom of the parent; the operators of the group leave it alone for random amplitudes and nothing else of the
 * grey parent does; index, domains and the counts of parameters; it lies in the irreps listed; the forms say what the
 * numbers say.
 */
export function configurationProblems(
  group: SpaceGroup,
  set: ConfigurationSet,
  sites: readonly SiteModes[],
  check: ConfigurationCheck,
): string[] {
  const random = seeded(check.seed);
  const chosen =
    set.configurations.length <= check.most
      ? set.configurations
      : Array.from({ length: check.most }, () => random.pick(set.configurations));
  const ids = new Set(set.configurations.map(({ id }) => id));
  const problems = ids.size === set.configurations.length ? [] : ["two configurations have one id"];
  for (const configuration of new Set(chosen))
    try {
      for (const problem of problemsOfOne(group, set, sites, configuration, check, random))
        problems.push(`${configuration.id} ${configuration.direction}: ${problem}`);
    } catch (error) {
      problems.push(`${configuration.id}: threw ${error instanceof Error ? error.message : String(error)}`);
    }
  return problems;
}

function problemsOfOne(
  group: SpaceGroup,
  set: ConfigurationSet,
  sites: readonly SiteModes[],
  configuration: Configuration,
  check: ConfigurationCheck,
  random: Random,
): string[] {
  if (configuration.notWritten !== null) return [];
  const problems: string[] = [];
  const { matrix, shift } = configuration.cell.cellFromParent;
  const columns = matrix.map((row) => row.map(([top, bottom]) => top / bottom));
  const axes = [0, 1, 2].map((axis) => columns.map((row) => row[axis] as number));
  if (determinant(axes) <= 0) problems.push("the child cell is not right-handed");
  const origin = shift.map(([top, bottom]) => top / bottom);
  const cell = supercell(group, sites, axes);
  const toParent = (operator: SymmetryOperator): FloatOperator => childToParent(operator, cell, origin);
  const own: GreyOperator[] = configuration.cell.operators.flatMap((one) =>
    configuration.cell.centrings.map((centring) => {
      const [first, second] = [toParent(centring.operator), toParent(one.operator)];
      return {
        operator: {
          rotation: second.rotation,
          translation: second.translation.map((entry, axis) => entry + (first.translation[axis] as number)),
        },
        timeReversal: (one.timeReversal * centring.timeReversal) as 1 | -1,
      };
    }),
  );
  const size = new Set(configuration.sites.flatMap((site) => site.amplitudes.map(({ amplitude }) => amplitude))).size;
  if (size !== configuration.freeParameters.irreps) problems.push("the amplitudes are not as many as the parameters");
  const amplitudes = Array.from({ length: size }, () => 2 * random.next() - 1);
  const spread = (moments: readonly (readonly number[])[]): Field | null =>
    spreadField(cell, own, configuration, moments, origin, problems);
  const field = spread(configuration.sites.map((site) => [0, 1, 2].map((axis) => momentOf(site, amplitudes, axis))));
  problems.push(...textProblems(configuration, amplitudes));
  if (field === null) return problems;
  const unchanged = own.filter((operator) => !isUnchanged(cell, field, operator));
  if (unchanged.length > 0) problems.push(`${unchanged.length} operators of the group change the field`);
  const grey = greyOperators(cell);
  const all = grey.filter((operator) => isUnchanged(cell, field, operator));
  if (all.length !== own.length)
    problems.push(`${all.length} operators of the parent leave the field alone, the group has ${own.length}`);
  const rotations = new Set(all.map(({ operator }) => operator.rotation.join())).size;
  if (configuration.index !== grey.length / all.length) problems.push(`the index is ${grey.length / all.length}`);
  if (configuration.domains.orientation !== cell.group.operators.length / rotations)
    problems.push(`orientation domains are ${cell.group.operators.length / rotations}`);
  if (configuration.magneticGroup.operators.length * latticePoints(configuration, axes) !== own.length)
    problems.push("the group in parent axes is not that of the cell");
  for (const { operator, timeReversal } of configuration.magneticGroup.operators)
    if (!isUnchanged(cell, field, { operator: floatOperator(operator), timeReversal }))
      problems.push("an operator of the group in parent axes changes the field");
  problems.push(...irrepProblems(set, cell, field, configuration));
  problems.push(...countProblems(set, cell, own, configuration, spread, check, random));
  return problems;
}

function floatOperator(operator: SymmetryOperator): FloatOperator {
  return {
    rotation: operator.rotation.map((entry) => entry / operator.rotationDenominator),
    translation: operator.translation.map((entry) => entry / operator.translationDenominator),
  };
}

/** `x = P x' + p`, so `R = P R' P⁻¹` and `t = P t' + p − R p`. */
function childToParent(operator: SymmetryOperator, cell: Supercell, origin: readonly number[]): FloatOperator {
  const own = floatOperator(operator);
  const p = cell.axes.flat();
  const rotation = timesMatrix(timesMatrix(p, own.rotation), cell.inverse.flat());
  const translation = turnColumn(p, own.translation).map(
    (entry, axis) => entry + (origin[axis] as number) - (turnColumn(rotation, origin)[axis] as number),
  );
  return { rotation, translation };
}

function timesMatrix(a: readonly number[], b: readonly number[]): number[] {
  return [0, 3, 6].flatMap((row) => turnRow(a.slice(row, row + 3), b));
}

function determinant(rows: readonly (readonly number[])[]): number {
  const [a, b, c] = rows as [number[], number[], number[]];
  const [a1, a2, a3] = a as [number, number, number];
  const [b1, b2, b3] = b as [number, number, number];
  const [c1, c2, c3] = c as [number, number, number];
  return a1 * (b2 * c3 - b3 * c2) - a2 * (b1 * c3 - b3 * c1) + a3 * (b1 * c2 - b2 * c1);
}

/** Lattice points of the group's own lattice in the child cell. */
function latticePoints(configuration: Configuration, axes: readonly (readonly number[])[]): number {
  const { vectors, denominator } = configuration.magneticGroup.lattice;
  return Math.round(determinant(axes) / determinant(vectors.map((row) => row.map((entry) => entry / denominator))));
}

/** Operators × centrings on the listed sites: every atom of the cell once, with one moment; parent components. */
function spreadField(
  cell: Supercell,
  own: readonly GreyOperator[],
  configuration: Configuration,
  moments: readonly (readonly number[])[],
  origin: readonly number[],
  problems: string[],
): Field | null {
  const field = new Float64Array(3 * cell.atoms.length).fill(Number.NaN);
  const p = cell.axes.flat();
  const counts = configuration.sites.map(() => new Set<number>());
  let clash = false;
  configuration.sites.forEach((site, number) => {
    const position = turnColumn(
      p,
      site.positionLattice.map(([top, bottom]) => top / bottom),
    ).map((entry, axis) => entry + (origin[axis] as number));
    const moment = turnColumn(p, moments[number] as readonly number[]);
    for (const { operator, timeReversal } of own) {
      const image = turnColumn(operator.rotation, position).map(
        (entry, axis) => entry + (operator.translation[axis] as number),
      );
      const target = cell.find(image);
      counts[number]?.add(target);
      const sign =
        timeReversal * Math.round(determinant([0, 3, 6].map((row) => operator.rotation.slice(row, row + 3))));
      turnColumn(operator.rotation, moment).forEach((entry, axis) => {
        const known = field[3 * target + axis] as number;
        if (!Number.isNaN(known) && Math.abs(known - sign * entry) > 1e-7) clash = true;
        field[3 * target + axis] = sign * entry;
      });
    }
  });
  if (clash) problems.push("the group gives one atom two moments");
  configuration.sites.forEach((site, number) => {
    if (counts[number]?.size !== site.multiplicity)
      problems.push(`${site.label} stands for ${counts[number]?.size} atoms of the cell, not ${site.multiplicity}`);
  });
  if (field.some(Number.isNaN)) {
    problems.push("the sites do not reach every atom of the parent");
    return null;
  }
  return clash ? null : field;
}

function momentOf(site: Configuration["sites"][number], values: readonly number[], axis: number): number {
  return site.amplitudes.reduce(
    (sum, { amplitude, momentLattice }) => sum + (momentLattice[axis] as number) * (values[amplitude] as number),
    0,
  );
}

const letters = ["u", "v", "w", "p", "q", "r", "s", "t", "f", "g", "h", "k", "l", "m", "n"];

function textProblems(configuration: Configuration, amplitudes: readonly number[]): string[] {
  const values = Object.fromEntries(
    amplitudes.map((value, index) => [
      `${letters[index % letters.length]}${index < letters.length ? "" : Math.floor(index / letters.length)}`,
      [value, 0] as const,
    ]),
  );
  return configuration.sites.flatMap((site) => {
    const written = site.momentLattice
      .slice(1, -1)
      .split(", ")
      .map((text) => evaluateText(text, values));
    // Numbers without a short exact form are written with six decimals: half of the last one for each amplitude.
    const rounding = /\d\.\d{3}/.test(site.momentLattice)
      ? 5e-7 * amplitudes.reduce((sum, value) => sum + Math.abs(value), 0)
      : 0;
    return written.some(
      ([re, im], axis) => Math.abs(im) > 1e-9 || Math.abs(re - momentOf(site, amplitudes, axis)) > 1e-8 + rounding,
    )
      ? [`the text ${site.momentLattice} of ${site.label} is not what its numbers say`]
      : [];
  });
}

/**
 * The field has Fourier components on the arms of the star (and their negatives) alone, and there in the irreps. Arms
 * that are not periodic with the cell carry nothing.
 */
function irrepProblems(set: ConfigurationSet, cell: Supercell, field: Field, configuration: Configuration): string[] {
  const k = componentsOf(set.k);
  const carriers = armCarriers(cell, k);
  const rebuilt = new Float64Array(field.length);
  const seen: number[][] = [];
  const problems: string[] = [];
  for (const operator of carriers)
    for (const sign of [1, -1]) {
      const arm = turnRow(k, inverse(operator).rotation).map((entry) => sign * entry);
      if (seen.some((other) => isReciprocalVector(cell.group, minus(arm, other))) || !isPeriodic(cell, arm)) continue;
      seen.push(arm);
      const components = fourierComponents(cell, field, arm);
      cell.atoms.forEach(({ site, atom, translation }, index) => {
        const turns = -2 * Math.PI * inner(arm, translation);
        const own = components[site] as FourierVector;
        for (let axis = 0; axis < 3; axis++)
          rebuilt[3 * index + axis] =
            (rebuilt[3 * index + axis] as number) +
            (own.real[3 * atom + axis] as number) * Math.cos(turns) -
            (own.imaginary[3 * atom + axis] as number) * Math.sin(turns);
      });
      if (sign === 1) problems.push(...armProblems(cell, configuration, components, operator, k));
    }
  if (differenceOf(rebuilt, field) > 1e-7) problems.push("the field has Fourier components off the star of k");
  return problems;
}

function isPeriodic(cell: Supercell, k: readonly number[]): boolean {
  return [0, 1, 2].every((axis) => {
    const turns = inner(
      k,
      cell.axes.map((row) => row[axis] as number),
    );
    return Math.abs(turns - Math.round(turns)) < 1e-9;
  });
}

/** Brings the components of one arm back to k, `S'_{j'} = e^{2πi k·a} det(R) R S_j`, and looks for them in the irreps. */
function armProblems(
  cell: Supercell,
  configuration: Configuration,
  components: readonly FourierVector[],
  carrier: FloatOperator,
  k: readonly number[],
): string[] {
  const back = inverse(carrier);
  return components.flatMap((vector, site) => {
    const { modes, irreps, positions } = cell.sites[site] as Supercell["sites"][number];
    const brought = carriedComponents(cell.group, positions, vector, back, k);
    const own = modes.flatMap((list, irrep) =>
      configuration.irreps.includes(irreps.labels[irrep] as string) ? list : [],
    );
    const width = 3 * positions.length;
    if ([...brought.real, ...brought.imaginary].every((entry) => Math.abs(entry) < 1e-8)) return [];
    return rankOf([...own, brought], width) === rankOf(own, width) ? [] : ["the field is not in the irreps listed"];
  });
}

/** One operator for every arm of the star. */
export function armCarriers(cell: Supercell, k: readonly number[]): FloatOperator[] {
  const arms: number[][] = [];
  return cell.group.operators.filter((operator) => {
    const arm = turnRow(k, inverse(operator).rotation);
    if (arms.some((other) => isReciprocalVector(cell.group, minus(arm, other)))) return false;
    arms.push(arm);
    return true;
  });
}

/** Dimensions by random fields averaged over the group. */
function countProblems(
  set: ConfigurationSet,
  cell: Supercell,
  own: readonly GreyOperator[],
  configuration: Configuration,
  spread: (moments: readonly (readonly number[])[]) => Field | null,
  check: ConfigurationCheck,
  random: Random,
): string[] {
  const { freeParameters, secondaryIrreps } = configuration;
  const problems: string[] = [];
  if (
    freeParameters.irreps + secondaryIrreps.reduce((sum, { parameters }) => sum + parameters, 0) !==
    freeParameters.group
  )
    problems.push("irreps and secondary irreps do not add up to the parameters of the group");
  const allowed = configuration.sites.map(({ symmformLattice }) => {
    const names = [...new Set(symmformLattice.match(/m[xyz]/g) ?? [])];
    const values = Object.fromEntries(names.map((name) => [name, [2 * random.next() - 1, 0] as const]));
    return {
      count: names.length,
      moment: symmformLattice
        .slice(1, -1)
        .split(", ")
        .map((text) => evaluateText(text, values)[0]),
    };
  });
  if (allowed.reduce((sum, { count }) => sum + count, 0) !== freeParameters.group)
    problems.push("the forms of the group have another number of letters than its parameters");
  spread(allowed.map(({ moment }) => moment));
  if (cell.atoms.length > check.mostAtoms) return problems;
  const averaged = (make: () => Field, expected: number): number =>
    rankOfFields(Array.from({ length: expected + 1 }, () => meanOver(cell, make(), own)));
  const whole = averaged(
    () => Float64Array.from({ length: 3 * cell.atoms.length }, () => 2 * random.next() - 1),
    freeParameters.group,
  );
  if (whole !== freeParameters.group) problems.push(`the group allows ${whole} parameters`);
  const k = componentsOf(set.k);
  // Arms that are not periodic with the cell average to nothing.
  const carriers = (set.arms === "pair" ? armCarriers(cell, k).slice(0, 1) : armCarriers(cell, k)).filter((operator) =>
    isPeriodic(cell, turnRow(k, inverse(operator).rotation)),
  );
  const part = averaged(() => randomIrrepField(cell, configuration.irreps, k, carriers, random), freeParameters.irreps);
  if (part !== freeParameters.irreps) problems.push(`the irreps allow ${part} parameters`);
  return problems;
}
