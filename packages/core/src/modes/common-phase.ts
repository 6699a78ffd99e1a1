import {
  type Cyclotomic,
  conjugateCyclotomic,
  cyclotomicFromRational,
  cyclotomicToRational,
  invertCyclotomic,
  isCyclotomicZero,
  multiplyCyclotomic,
  type Phase,
  rational,
  reduceOrder,
  rootOfUnity,
  rootTurns,
  scaleForm,
  squareRootOf,
  subtractForms,
} from "../numbers/index.js";
import type { Term, TermMoment } from "./constraint-table.js";

/**
 * The terms with their common phase, which is free, chosen so that the first letter stands alone where it first
 * occurs, and each letter's real scale likewise. Letters that occur with their conjugates take the phase up.
 */
export function withPlainPhase(terms: readonly Term[]): Term[] {
  const [first] = terms;
  if (!first) return [];
  const common = first.moments.some((moment) => moment.conjugate) ? null : leadingPhase(first);
  // One scale a letter: its terms with different components of the order parameter must keep their ratio.
  const scales = new Map<string, Cyclotomic | null>();
  for (const term of terms) if (!scales.has(term.letter)) scales.set(term.letter, plainScale(term));
  return terms.map((term) =>
    scaled(common === null ? term : shifted(term, common), scales.get(term.letter) as Cyclotomic | null),
  );
}

/** The first entry that is not zero; each term has one. */
function leading(term: Term): { phase: Phase; entry: Cyclotomic } {
  const { phase, vector } = term.moments.find((moment) => !moment.vector.every(isCyclotomicZero)) as TermMoment;
  return { phase, entry: vector.find((value) => !isCyclotomicZero(value)) as Cyclotomic };
}

/** |entry| as an exact number when its square is a fraction, else null. */
function modulus(entry: Cyclotomic): Cyclotomic | null {
  const squared = cyclotomicToRational(reduceOrder(multiplyCyclotomic(entry, conjugateCyclotomic(entry))));
  if (squared === null) return null;
  return multiplyCyclotomic(squareRootOf(squared[0] * squared[1]), cyclotomicFromRational(rational(1, squared[1])));
}

/** e^{2πi·phase}·root of the first entry of a term: what the common phase is to take away. */
interface CommonPhase {
  readonly phase: Phase;
  readonly root: Cyclotomic;
}

function leadingPhase(term: Term): CommonPhase | null {
  const { phase, entry } = leading(term);
  const size = modulus(entry);
  const turns = size && rootTurns(multiplyCyclotomic(entry, invertCyclotomic(size)));
  return turns && { phase, root: rootOfUnity(turns) };
}

/** A letter that meets its conjugate absorbs the phase on its own side, so the conjugate's side gets it twice. */
function shifted(term: Term, { phase, root }: CommonPhase): Term {
  const paired = term.moments.some((moment) => moment.conjugate);
  const back = conjugateCyclotomic(paired ? multiplyCyclotomic(root, root) : root);
  return {
    ...term,
    moments: term.moments.map((moment) => {
      if (paired && !moment.conjugate) return moment;
      return {
        ...moment,
        phase: subtractForms(moment.phase, paired ? scaleForm([2, 1], phase) : phase),
        vector: moment.vector.map((entry) => reduceOrder(multiplyCyclotomic(back, entry))),
      };
    }),
  };
}

/** |leading entry|⁻¹ of a term, the real scale that its letter takes up; null where it has no simple form. */
function plainScale(term: Term): Cyclotomic | null {
  const size = modulus(leading(term).entry);
  return size && invertCyclotomic(size);
}

function scaled(term: Term, factor: Cyclotomic | null): Term {
  if (factor === null) return term;
  return {
    ...term,
    moments: term.moments.map((moment) => ({
      ...moment,
      vector: moment.vector.map((entry) => reduceOrder(multiplyCyclotomic(factor, entry))),
    })),
  };
}
