import { ionState } from "../../diffraction/index.js";
import { type Rational, toNumber } from "../../numbers/index.js";
import type { SiteOrbit } from "../../spacegroups/index.js";

/** A site of the parent structure with what stands there. */
export interface NamedSite {
  readonly orbit: SiteOrbit;
  readonly ion: string | null;
  readonly occupancy: number;
  /** Spin quantum number where it is given. */
  readonly spin: Rational | null;
}

/** The sites of the parent: those that may carry moments, in the order of the set, and the others. */
export interface ParentSites {
  readonly magnetic: readonly NamedSite[];
  readonly others: readonly NamedSite[];
}

/** μB of the free ion: 2S where the spin is given, else by Hund's rules. */
export function limitOf({ ion, spin }: NamedSite): number | null {
  if (spin !== null) return 2 * toNumber(spin);
  return (ion === null ? null : ionState(ion)?.largestMoment) ?? null;
}
