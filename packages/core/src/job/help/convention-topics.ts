import { commandTable } from "../commands.js";
import type { HelpTopic } from "./topics.js";

/** Longest line of a page. */
const width = 100;

/** Signs, bases, units; and what this version does. */
export const conventionTopics: { readonly [topic: string]: HelpTopic } = {
  conventions: {
    title: "Signs, bases and units",
    text: `Operators      x' = R x + t on fractional coordinates, written as triplets: -x+1/2,-y,z+1/2
Wave vectors   rows in a*, b*, c* of the setting's own axes; R takes k to k R⁻¹; 2π is written out
Phases         a lattice translation T is exp(+2πi k·T) in D; the moment on atom j in the cell
               at T is M_j(T) = S_j exp(−2πi k·T) + c.c., without a factor 1/2: a wave of
               amplitude 2|S|.
               Where 2k is a reciprocal lattice vector: M_j(T) = S_j exp(−2πi k·T) with real S_j.
               The phase runs with T alone, not with the position of the atom in the cell.
Moments        axial vectors; S along a, b, c (lattice components, no unit)
Irreps         Γ1, Γ2, … by dimension, then by characters; the number is kvane's own, the characters
               printed beside it identify an irrep elsewhere. Reality is Herring's, of the irrep of
               the whole space group.
Basis vectors  Γ(g) e(c,p) = Σ_q D(g)(q,p) e(c,q) for copy c and partners p, q; not normalized
Units          Å, degrees, Q = 2π/d in Å⁻¹
Evidence       natural log-odds that the peaks are lines of this k and not chance:
               above 3 found, 0 to 3 weak, below 0 not informative`,
  },
  fourier: {
    title: "How Fourier components are written",
    text: `kvane's own way: M_j(T) = S_j exp(−2πi k·T) + c.c. on atom j in the cell at T, components along
a, b, c. Options of \`kvane modes\` write basis vectors and tables otherwise; every table says how.

  --exponent minus|plus        sign of the exponent: S becomes its complex conjugate
  --phase lattice|position     the phase runs with T, or with T + r_j: S_j gets exp(+2πi k·r_j)
                               (the conjugate of that with --exponent plus)
  --factor one|half            wave + c.c. as it stands, or times 1/2: S is doubled
                               (not where 2k is a reciprocal lattice vector)
  --components lattice         S = S₁ a + S₂ b + S₃ c, exact
               crystal         along the unit vectors of a, b, c (the crystalaxis components of
                               the IUCr magnetic dictionary), numbers, needs --cell
               cartesian       x along a, z along c*, numbers, needs --cell

--read FILE takes components that somebody else has written in the convention named by these
options: a row for each atom, its number in the table and three complex numbers, such as
1  0.5+0.1i  0  -0.3. They are printed in kvane's own way, with share and amplitudes of each irrep.

Letters of a table of what is allowed stand for components as written, so the factor never shows in
it. In crystal and Cartesian components each copy of an irrep is divided by the length of the axis
of its leading entry, so that an amplitude in μB is the moment along that axis. The matrix B of the
relation between k and −k is that of kvane's own way always.`,
  },
  arrangements: {
    title: "Reading a list of configurations",
    text: `A configuration is one direction of the order parameter of an irrep (or of several), up to
equivalence: what a parent operator makes of it is a domain of it.
  direction       real components of the order parameter; ; parts arms, | parts order parameters
  magnetic group  symbol and number of Belov, Neronova and Smirnova (BNS)
  index           of that group in the parent with time reversal: the number of domains
  free            real parameters of the moments under the irreps, and of how many under the group
                  where that lets in more: secondary irreps, which may come with small amplitudes
  equal sizes     whether amplitudes exist that give all moments of a site one size
  net moment, polarization, tensors
                  what the magnetic point group allows, Cartesian, x along a and z along c* of the
                  parent, equal symbols for equal entries; "as before": the parent had it already
Positions and moments are in the child cell, whose axes are given in those of the parent; operators
and centrings applied to the sites give every moment. u, v, w are free amplitudes of the irreps, mx,
my, mz components under the group. Exact numbers that no short root writes have six decimals.

kvane export writes one configuration as a magnetic CIF; kvane decompose reads one back into irreps
and says which configuration it is.`,
  },
  commands: {
    title: "What this version does",
    text: `${inLines(Object.keys(commandTable))}
and many of them in one go: batch (kvane help requests).

kvane COMMAND --help shows options and an example that works when pasted.`,
  },
};

/** Names with commas in lines that fit a page. */
function inLines(names: readonly string[]): string {
  const lines: string[] = [];
  for (const name of names) {
    const last = lines.at(-1);
    if (last !== undefined && `${last}, ${name},`.length <= width) lines[lines.length - 1] = `${last}, ${name}`;
    else lines.push(`  ${name}`);
  }
  return lines.join(",\n");
}
