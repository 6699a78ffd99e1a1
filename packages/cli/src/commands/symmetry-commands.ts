import type { CommandSpec } from "../command-spec.js";
import { outputOptions } from "../options.js";

/** From the group to the modes. */
export const symmetryCommands: readonly CommandSpec[] = [
  {
    name: "ops",
    summary: "operators of the group",
    argument: "group or study",
    options: ["example", ...outputOptions],
    examples: ["kvane ops 62", 'kvane ops "hall:-P 2ac 2n"'],
  },
  {
    name: "star",
    summary: "arms, little group and kind of k",
    argument: "group or study",
    options: ["k", "example", ...outputOptions],
    examples: ['kvane star "P n m a" --k 0,1/2,0'],
  },
  {
    name: "irreps",
    summary: "small irreps: matrices, characters, reality",
    argument: "group or study",
    options: ["k", "example", ...outputOptions],
    examples: ['kvane irreps "P n m a" --k 0,1/2,0'],
  },
  {
    name: "modes",
    summary: "decomposition, mode vectors and what each irrep allows",
    argument: "group or study",
    options: ["k", "sites", "polar", "example", "csv", ...outputOptions],
    examples: ['kvane modes 62 --k 0,0,0 --site "Fe 0 0 1/2" --site "R 0.05 1/4 0.98"'],
  },
];
