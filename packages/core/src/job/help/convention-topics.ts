import { commandTable, plannedCommands } from "../commands.js";
import type { HelpTopic } from "./topics.js";

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
  commands: {
    title: "What this version does",
    text: `Built:
  ${Object.keys(commandTable).join(", ")}
Planned:
  ${plannedCommands.slice(0, 6).join(", ")},
  ${plannedCommands.slice(6).join(", ")}

kvane COMMAND --help shows options and an example that works when pasted.`,
  },
};
