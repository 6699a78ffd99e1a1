import type { IrrepModes, Mode } from "./types.js";

/** The modes of the irrep with that label; none without a label. */
export function modesOf(parts: readonly Pick<IrrepModes, "irrep" | "modes">[], label: string | null): Mode[] {
  return parts.flatMap(({ irrep, modes }) => (irrep.label === label ? modes : []));
}
