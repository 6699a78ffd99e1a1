import {
  addVectors,
  type Cyclotomic,
  cyclotomicFromRational,
  cyclotomicToComplex,
  type Rational,
  type RationalVector,
  rationalField,
  reducedEchelon,
  roundNumber,
  timesColumn,
  vectorFrom,
} from "../numbers/index.js";
import { fromPrimitiveColumn, type SpaceGroup } from "../spacegroups/index.js";
import type { CellMetric } from "./cell-metric.js";
import { type ChildCell, reduceToCell } from "./child-cell.js";
import { amplitudeLetter, sumText } from "./form-text.js";
import type { MomentRows } from "./moment-fields.js";
import type { SiteFrame } from "./site-frames.js";
import type { SplitOrbit } from "./split-orbits.js";
import type { AmplitudeShare, ConfigurationSite } from "./types.js";

/** One site of the parent with its split orbits and what the listed irreps put on their representatives. */
export interface SiteShare {
  readonly frame: SiteFrame;
  readonly orbits: readonly SplitOrbit[];
  readonly moments: MomentRows;
}

/** The asymmetric unit of a magnetic group: sites in the child cell with their forms. Amplitude letters run through all. */
export function configurationSites(
  group: SpaceGroup,
  child: ChildCell,
  shares: readonly SiteShare[],
  metric: CellMetric,
): ConfigurationSite[] {
  const points = child.centrings.filter(({ timeReversal }) => timeReversal === 1).length;
  let used = 0;
  return shares.flatMap(({ frame, orbits, moments }) => {
    const first = used;
    used += moments.rows.length;
    const terms = termsByColumn(moments);
    return orbits.map((orbit, number): ConfigurationSite => {
      const own = [0, 1, 2].map((axis) => terms.get(3 * number + axis) ?? []);
      const forms = allowedForms(orbit.allowed);
      const amplitudes = floatTerms(own, first);
      return {
        label: orbits.length === 1 ? frame.orbit.label : `${frame.orbit.label}_${number + 1}`,
        parentSite: frame.orbit.label,
        positionLattice: positionIn(group, child, frame, orbit),
        multiplicity: orbit.members * points,
        momentLattice: tuple(
          own.map((list) => sumText(list.map(({ row, factor }) => ({ factor, letter: amplitudeLetter(first + row) })))),
        ),
        symmformLattice: tuple(forms.map((list) => sumText(list.map(exactTerm)))),
        symmformCrystal: metric.crystalForm(forms),
        exampleLattice: exampleMoment(amplitudes),
        amplitudes,
      };
    });
  });
}

interface ColumnTerm {
  readonly row: number;
  readonly factor: Cyclotomic;
}

function termsByColumn({ rows }: MomentRows): Map<number, ColumnTerm[]> {
  const terms = new Map<number, ColumnTerm[]>();
  rows.forEach((row, index) => {
    for (const [column, factor] of row) terms.set(column, [...(terms.get(column) ?? []), { row: index, factor }]);
  });
  return terms;
}

/** The amplitudes that reach an atom with what each puts there. */
function floatTerms(components: readonly (readonly ColumnTerm[])[], first: number): AmplitudeShare[] {
  const found = new Map<number, [number, number, number]>();
  components.forEach((list, axis) => {
    for (const { row, factor } of list) {
      const share = found.get(first + row) ?? [0, 0, 0];
      share[axis] = roundNumber(cyclotomicToComplex(factor)[0]);
      found.set(first + row, share);
    }
  });
  return [...found].sort(([a], [b]) => a - b).map(([amplitude, momentLattice]) => ({ amplitude, momentLattice }));
}

function exampleMoment(shares: readonly AmplitudeShare[]): [number, number, number] {
  const at = (axis: 0 | 1 | 2): number =>
    roundNumber(shares.reduce((sum, share) => sum + share.momentLattice[axis] * exampleAmplitude(share.amplitude), 0));
  return [at(0), at(1), at(2)];
}

function tuple(entries: readonly string[]): string {
  return `(${entries.join(", ")})`;
}

const momentNames = ["mx", "my", "mz"];

/** One term of a component of a form: a multiple of mx, my or mz. */
export interface FormTerm {
  readonly factor: Rational;
  readonly axis: number;
}

/** Echelon form from the left: each free component keeps its own name and later ones follow. */
export function allowedForms(allowed: readonly (readonly Rational[])[]): FormTerm[][] {
  const { rows, pivots } = reducedEchelon(allowed, rationalField);
  return [0, 1, 2].map((axis) =>
    rows.flatMap((row, index) => {
      const factor = row[axis] as Rational;
      return factor[0] === 0 ? [] : [{ factor, axis: pivots[index] as number }];
    }),
  );
}

export function exactTerm({ factor, axis }: FormTerm): { factor: Cyclotomic; letter: string } {
  return { factor: cyclotomicFromRational(factor), letter: momentNames[axis] as string };
}

function positionIn(group: SpaceGroup, child: ChildCell, frame: SiteFrame, orbit: SplitOrbit): RationalVector {
  const position = addVectors(
    frame.orbit.positions[orbit.atom] as RationalVector,
    fromPrimitiveColumn(group.lattice, vectorFrom(orbit.cell)),
  );
  return reduceToCell(timesColumn(child.inverse, position));
}

/** One-digit numbers without a simple law, and so far apart that no two amplitudes are equal by chance. */
const examples = [1, 0.7, 0.4, 0.9, 0.6, 0.3, 0.8, 0.5] as const;

/** A generic choice of amplitudes; beyond the eighth each round of numbers is shifted a little. */
export function exampleAmplitude(index: number): number {
  const round = Math.floor(index / examples.length);
  return Math.round(100 * ((examples[index % examples.length] as number) + 0.03 * round)) / 100;
}
