import { type Cyclotomic, isConstantForm, type LinearForm, rootOfUnity } from "../numbers/index.js";

/** e^{2πi·turns} where the letters of k cancel, as they do between operators that fix an atom and between copies on one suborbit. */
export function constantRoot(turns: LinearForm): Cyclotomic {
  if (!isConstantForm(turns)) throw new Error("a phase within one suborbit depends on a free parameter of k");
  return rootOfUnity(turns.constant);
}
