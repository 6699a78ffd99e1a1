import { type Cyclotomic, isConstantForm, type LinearForm, rootOfUnity } from "../numbers/index.js";

/**
 * e^{2πi·turns} of a phase in turns (`waveTimesColumn`) in which the letters of k cancel, as they do between operators that
 * fix an atom, between copies on one suborbit, and wherever k meets −k. An `Error` where one is left.
 */
export function constantRoot(turns: LinearForm): Cyclotomic {
  if (!isConstantForm(turns)) throw new Error("a phase that must be a number depends on a free parameter of k");
  return rootOfUnity(turns.constant);
}
