/** What the size of a moment says beside what the free ion can have. */
export type MomentVerdict = "beyond the ion" | "usual" | "low";

/** Share of the limit by which a refined moment may exceed it: form factor and scale are not known better. */
const toleratedExcess = 0.05;

/**
 * Share of the limit below which an ordered moment asks for a reason. Zero-point motion alone takes 0.08 to 0.26 of a spin
 * on the cubic, square, honeycomb and triangular lattices (linear spin waves; P. W. Anderson, Phys. Rev. 86 (1952) 694):
 * a spin 1/2 keeps 0.61 on the square lattice (A. W. Sandvik, Phys. Rev. B 56 (1997) 11678) and 0.41 on the triangular one
 * (White & Chernyshev, Phys. Rev. Lett. 99 (2007) 127004), larger spins more; covalency takes up to a tenth or two. Values
 * from memory.
 */
const lowShare = 0.4;

/**
 * Judges an ordered moment in μB against the largest one of the free ion (2S, or g_J J of rare earths). Chains, frustrated
 * magnets, itinerant moments and crystal-field singlets have less with good reason: the verdict is a question, no error.
 */
export function momentVerdict(size: number, limit: number): MomentVerdict {
  if (size > (1 + toleratedExcess) * limit) return "beyond the ion";
  return size < lowShare * limit ? "low" : "usual";
}
