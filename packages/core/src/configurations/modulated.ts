import { breathe, type WorkHost } from "../algorithms/index.js";
import type { SmallIrreps } from "../irreps/index.js";
import { star, type WaveVector } from "../kvectors/index.js";
import { type MagneticOperator, magneticGroup, type SuperspaceOperator } from "../magneticgroups/index.js";
import {
  addForms,
  type Cyclotomic,
  cyclotomicNumbers,
  cyclotomicOne,
  cyclotomicZero,
  fractionalPart,
  identityMatrix,
  isConstantForm,
  isCyclotomicZero,
  type LinearForm,
  multiplyCyclotomic,
  nullSpace,
  type Rational,
  type RationalVector,
  rational,
  reducedEchelon,
  reduceOrder,
  rootOfUnity,
  scaleForm,
  subtract,
  subtractCyclotomic,
  subtractForms,
  zeroForm,
  zeroVector,
} from "../numbers/index.js";
import {
  latticeVectorsOfCell,
  operatorFrom,
  rotationOf,
  type SpaceGroup,
  type SymmetryOperator,
} from "../spacegroups/index.js";
import type { CommensurateRequest } from "./commensurate.js";
import { consequencesIn } from "./consequences.js";
import { imaginaryPart, realPart } from "./fixed-vectors.js";
import { directionLetter, sumText } from "./form-text.js";
import { modulatedSites } from "./modulated-sites.js";
import type { ModulatedConfiguration } from "./modulated-types.js";
import { type PhaseAction, type PhaseElement, phaseActions, sumOfPhaseActions } from "./phase-action.js";
import { type PhaseClass, type PhaseClasses, phaseClasses, type ShiftedElement } from "./phase-isotropy.js";
import { type SiteFrame, siteFrame } from "./site-frames.js";
import type { SparseRow } from "./sparse-echelon.js";
import { isInside } from "./subspaces.js";
import { amplitudeModes, modulatedOrbits, modulatedRows, type PlacedSuperspace } from "./superspace-fields.js";

interface Candidate {
  readonly actions: readonly PhaseAction[];
  readonly elements: readonly PhaseElement[];
  readonly list: PhaseClasses;
  readonly found: PhaseClass;
  readonly made: Omit<ModulatedConfiguration, "id" | "subgroupOf">;
}

/** All arrangements with one incommensurate pair ±k, each with its superspace operators. */
export async function modulatedConfigurations(
  request: CommensurateRequest,
  host: WorkHost,
): Promise<{ modulated: ModulatedConfiguration[]; bounded: string[] }> {
  const { group, irreps } = request;
  const frames = request.sites.map((site) => siteFrame(group, site));
  const bounded =
    request.arms === "pair"
      ? []
      : [
          "several arms of an incommensurate k need a superspace of more than four dimensions: only the pair ±k is listed",
        ];
  const reversing = irreps.minusK === "in star" ? star(group, irreps.k).reversing : [];
  const carried = (label: string): boolean =>
    frames.some((frame) => allowedOn(request, frame, label) && copiesOf(frame, label) > 0);
  const actions = phaseActions(
    group,
    irreps,
    reversing,
    (label) => carried(label) && (request.together === null || request.together.flat().includes(label)),
  );
  const sets =
    request.together === null
      ? actions.map((action) => [action])
      : request.together.map((labels) => actions.filter((action) => action.labels.some((own) => labels.includes(own))));
  const candidates: Candidate[] = [];
  const properties = request.cell === null ? null : consequencesIn(group, request.cell);
  for (const set of sets) {
    if (set.length === 0) continue;
    const { size, elements } = sumOfPhaseActions(set);
    const list = await phaseClasses(size, elements, request.limit, host);
    if (list.bounded !== null) bounded.push(`${set.map(({ labels }) => labels.join("+")).join(", ")}: ${list.bounded}`);
    const own: Candidate[] = [];
    for (const found of list.classes) {
      await breathe(host);
      if (!takesAll(set, found)) continue;
      const plain = configurationOf(request, frames, set, elements, list, found);
      const made = { ...plain, consequences: properties === null ? null : properties(plain.magneticGroup) };
      // One complex amplitude alone cannot have a free phase.
      if (found.needsSecond && made.freePhases === 0) continue;
      own.push({ actions: set, elements, list, found, made });
    }
    candidates.push(
      ...own.sort(
        (a, b) =>
          Number(a.found.needsSecond) - Number(b.found.needsSecond) ||
          b.found.members.length - a.found.members.length ||
          a.found.space.rows - b.found.space.rows ||
          (a.made.direction < b.made.direction ? -1 : 1),
      ),
    );
  }
  const ids = identifiers(candidates);
  const graph = supergroups(candidates);
  return {
    bounded,
    modulated: candidates.map(({ made }, index) => ({
      id: ids[index] as string,
      ...made,
      subgroupOf: (graph[index] as number[]).map((other) => ids[other] as string),
    })),
  };
}

function copiesOf(frame: SiteFrame, label: string): number {
  return frame.modes.irreps.find(({ irrep }) => irrep.label === label)?.multiplicity ?? 0;
}

function allowedOn(request: CommensurateRequest, frame: SiteFrame, label: string): boolean {
  return request.onSites[frame.orbit.label]?.includes(label) ?? true;
}

/** Whether every order parameter of the set has a component in the fixed space. */
function takesAll(set: readonly PhaseAction[], { space }: PhaseClass): boolean {
  let start = 0;
  return set.every(({ size }) => {
    const [from, to] = [2 * start, 2 * (start + size)];
    start += size;
    for (let row = 0; row < space.rows; row++)
      for (let column = from; column < to; column++) if (space.basis[row * space.width + column] !== 0) return true;
    return false;
  });
}

function identifiers(candidates: readonly Candidate[]): string[] {
  const counts = new Map<string, number>();
  return candidates.map(({ actions }) => {
    const name = actions.map(({ irrep }) => irrep.label).join("+");
    const number = (counts.get(name) ?? 0) + 1;
    counts.set(name, number);
    return `${name}.${number}`;
  });
}

/** Minimal supergroups among the classes of one set of order parameters, whose fixed spaces lie inside. */
function supergroups(candidates: readonly Candidate[]): number[][] {
  const above = candidates.map(
    (one) =>
      new Set(
        candidates.flatMap((other, index) =>
          other !== one &&
          other.list === one.list &&
          other.found.space.rows < one.found.space.rows &&
          other.found.orbit.some((space) => isInside(space, one.found.space, one.list.field.prime))
            ? [index]
            : [],
        ),
      ),
  );
  return above.map((found) =>
    [...found].filter((candidate) => ![...found].some((between) => above[between]?.has(candidate) === true)),
  );
}

function configurationOf(
  request: CommensurateRequest,
  frames: readonly SiteFrame[],
  set: readonly PhaseAction[],
  elements: readonly PhaseElement[],
  list: PhaseClasses,
  found: PhaseClass,
): Omit<ModulatedConfiguration, "id" | "subgroupOf" | "consequences"> {
  const { group, irreps } = request;
  const operators = placedOperators(group, irreps, elements, found.members, list.steps);
  const listed = set.flatMap(({ labels }) => labels);
  const shares = frames.map((frame) => {
    const orbits = modulatedOrbits(group, irreps.k, frame, operators);
    const rowsOf = (labels: readonly string[]): SparseRow[] =>
      modulatedRows(
        group,
        irreps.k,
        frame,
        operators,
        orbits,
        labels.flatMap((label) => amplitudeModes(irreps.k, frame, label)),
      );
    return { frame, orbits, rowsOf, rows: rowsOf(listed.filter((label) => allowedOn(request, frame, label))) };
  });
  const parameters = shares.reduce((sum, { rows }) => sum + rows.length, 0);
  const locked = operators.some(({ operator }) => operator.epsilon === -1);
  const rotations = new Set(operators.map(({ index }) => index)).size;
  const order = group.operators.length;
  const pairs =
    order /
    (irreps.littleGroup.operators.length + (elements.some(({ epsilon }) => epsilon === -1) ? elements.length / 2 : 0));
  return {
    irreps: listed,
    direction: exactDirection(set, elements, found, list.steps),
    arms: [0],
    index: order / rotations,
    domains: { total: order / rotations, k: pairs, orientation: order / rotations },
    freeParameters: {
      irreps: parameters,
      group: shares.reduce((sum, { orbits }) => sum + orbits.reduce((own, { allowed }) => own + allowed.length, 0), 0),
    },
    freePhases: locked ? 0 : Math.max(0, parameters / 2 - 1),
    needsSecondOrderParameter: found.needsSecond,
    secondaryIrreps: irreps.irreps.flatMap(({ label }) => {
      if (listed.includes(label)) return [];
      const own = shares.reduce((sum, { rowsOf }) => sum + rowsOf([label]).length, 0);
      return own === 0 ? [] : [{ label, k: irreps.k, parameters: own }];
    }),
    severalIrreps: set.length > 1,
    superspace: {
      k: irreps.k,
      operators: operators.map(({ operator }) => operator),
      centrings: centringsOf(group),
    },
    magneticGroup: magneticGroup(group.lattice, [
      { operator: operatorFrom(identityMatrix, zeroVector), timeReversal: -1 },
      ...operators.map(
        ({ index }): MagneticOperator => ({
          operator: group.operators[index] as SymmetryOperator,
          timeReversal: 1,
        }),
      ),
    ]),
    sites: modulatedSites(irreps.k, shares),
  };
}

/**
 * The operators of the class, in the group's order. The wave is shifted so that the inversion, else the first operator
 * with ε = −1, has no phase shift; of the two forms that half a period gives, that with δ below 1/2 is taken.
 */
function placedOperators(
  group: SpaceGroup,
  irreps: SmallIrreps,
  elements: readonly PhaseElement[],
  members: readonly ShiftedElement[],
  steps: number,
): PlacedSuperspace[] {
  const reversed = members.filter(({ element }) => elements[element]?.epsilon === -1);
  const isInversion = ({ element }: ShiftedElement): boolean =>
    group.primitive.rotations[elements[element]?.operator as number]?.join() === "-1,0,0,0,-1,0,0,0,-1";
  const reference = reversed.find(isInversion) ?? reversed[0];
  const placed = members.map(({ element, step }): PlacedSuperspace => {
    const { operator: index, epsilon } = elements[element] as PhaseElement;
    const operator = group.operators[index] as SymmetryOperator;
    const zeroed = epsilon === 1 || reference === undefined ? step : step - reference.step;
    const turns = fractionalPart(rational(zeroed, steps));
    const primed = 2 * turns[0] >= turns[1];
    return {
      index,
      turns,
      operator: {
        operator,
        timeReversal: primed ? -1 : 1,
        epsilon,
        shift: reciprocalShift(irreps.k, operator, epsilon),
        delta: primed ? subtract(turns, [1, 2]) : turns,
      },
    };
  });
  return placed.sort((a, b) => a.index - b.index);
}

/** `H = k R − ε k`. */
function reciprocalShift(k: WaveVector, operator: SymmetryOperator, epsilon: 1 | -1): RationalVector {
  const rotation = rotationOf(operator);
  return [0, 1, 2].map((column): Rational => {
    const form = k.components.reduce(
      (sum: LinearForm, component, row) => addForms(sum, scaleForm(rotation[row]?.[column] as Rational, component)),
      zeroForm,
    );
    const rest = subtractForms(form, scaleForm([epsilon, 1], k.components[column] as LinearForm));
    if (!isConstantForm(rest)) throw new Error("an operator of the extended little group does not keep k");
    return rest.constant;
  }) as unknown as RationalVector;
}

function centringsOf(group: SpaceGroup): SuperspaceOperator[] {
  return ([1, -1] as const).flatMap((timeReversal) =>
    latticeVectorsOfCell(group.lattice).map((vector) => ({
      operator: operatorFrom(identityMatrix, vector),
      timeReversal,
      epsilon: 1 as const,
      shift: zeroVector,
      delta: (timeReversal === 1 ? [0, 1] : [1, 2]) as Rational,
    })),
  );
}

/** The fixed space in exact real coordinates. */
function exactDirection(
  set: readonly PhaseAction[],
  elements: readonly PhaseElement[],
  { members, space }: PhaseClass,
  steps: number,
): string {
  const width = space.width;
  const equations = members.flatMap(({ element, step }) =>
    realEquations(elements[element] as PhaseElement, rootOfUnity(rational(step, steps))),
  );
  const basis = nullSpace(equations, width, cyclotomicNumbers, cyclotomicZero, cyclotomicOne);
  const { rows } = reducedEchelon(basis, cyclotomicNumbers);
  const components = Array.from({ length: width }, (_, column) =>
    sumText(
      rows.flatMap((row, index) => {
        const factor = row[column] as Cyclotomic;
        return isCyclotomicZero(factor) ? [] : [{ factor: reduceOrder(factor), letter: directionLetter(index) }];
      }),
    ),
  );
  let start = 0;
  const texts = set.map(({ size }) => {
    const own = components.slice(start, start + 2 * size);
    start += 2 * size;
    return own.join(", ");
  });
  return `(${texts.join(" | ")})`;
}

/** Rows of the real matrix of `ξ → c U ξ` or `c U ξ*` less 1, coordinates Re, Im in turn. */
function realEquations({ matrix, epsilon }: PhaseElement, phase: Cyclotomic): Cyclotomic[][] {
  return matrix.flatMap((row, r) => {
    const parts = row.map((entry) => {
      const value = multiplyCyclotomic(phase, entry);
      return { re: realPart(value), im: imaginaryPart(value) };
    });
    const negative = (value: Cyclotomic): Cyclotomic => subtractCyclotomic(cyclotomicZero, value);
    const rows = [
      parts.flatMap(({ re, im }) => [re, epsilon === 1 ? negative(im) : im]),
      parts.flatMap(({ re, im }) => [im, epsilon === 1 ? re : negative(re)]),
    ];
    return rows.map((entries, part) =>
      entries.map((entry, column) => (column === 2 * r + part ? subtractCyclotomic(entry, cyclotomicOne) : entry)),
    );
  });
}
