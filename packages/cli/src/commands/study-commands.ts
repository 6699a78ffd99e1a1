import type { CommandSpec } from "../command-spec.js";

/** The whole job and its study file. */
export const studyCommands: readonly CommandSpec[] = [
  {
    name: "run",
    summary: "the whole job: k from the peaks or as given, little group, irreps, modes, satellites",
    argument: "study",
    options: [
      "example",
      "k",
      "peaks",
      "as",
      "wavelength",
      "tolerance",
      "unmatched",
      "qMax",
      "maxDimension",
      "zeroShift",
      "cellScale",
      "branches",
      "json",
      "folder",
      "force",
      "quiet",
    ],
    examples: ["kvane run --example", "kvane run --example --k 0,0,1/2"],
  },
  {
    name: "check",
    summary: "validate a study and the files it names",
    argument: "study",
    options: ["example", "json", "out", "force", "quiet"],
    examples: ["kvane check --example"],
  },
];
