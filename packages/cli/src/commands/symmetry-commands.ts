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
    name: "atlas",
    summary: "all kinds of k of the group, and where a given k belongs",
    argument: "group or study",
    options: ["k", "cell", "within", "example", "csv", ...outputOptions],
    examples: ["kvane atlas 62", 'kvane atlas "P 63/m m c" --k 0.329,0.329,1 --cell "7.14 7.14 5.90 90 90 120"'],
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
    summary: "small irreps: matrices, characters, reality, relation between k and −k",
    argument: "group or study",
    options: ["k", "full", "example", ...outputOptions],
    examples: ['kvane irreps "P n m a" --k 0,1/2,0', 'kvane irreps "P 21 3" --k u,u,u --full'],
  },
  {
    name: "compatibility",
    summary: "how irreps of a point split along a line or plane",
    argument: "group or study",
    options: ["from", "to", "example", "csv", ...outputOptions],
    examples: ['kvane compatibility "P m -3 m" --from 0,0,0 --to 0,v,0'],
  },
  {
    name: "modes",
    summary: "decomposition, mode vectors and what each irrep allows",
    argument: "group or study",
    options: [
      "k",
      "sites",
      "cell",
      "polar",
      "star",
      "exponent",
      "phase",
      "factor",
      "components",
      "read",
      "example",
      "csv",
      ...outputOptions,
    ],
    examples: [
      'kvane modes 62 --k 0,0,0 --site "Fe 0 0 1/2" --site "R 0.05 1/4 0.98"',
      'kvane modes "P b n m" --k 0,0.28,0 --site "Tb -0.02 0.07 1/4" --phase position',
    ],
  },
];
