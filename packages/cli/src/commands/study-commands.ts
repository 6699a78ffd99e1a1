import type { CommandSpec } from "../command-spec.js";
import { outputOptions } from "../options.js";

/** What the whole job may be told besides its study, whether it prints or writes a report. */
const wholeJobOptions = [
  "structure",
  "block",
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
  "exclude",
  "impurities",
  "nuclear",
  "weighIntensities",
  "branches",
] as const;

/** The whole job and its study file. */
export const studyCommands: readonly CommandSpec[] = [
  {
    name: "run",
    summary: "the whole job: k from the peaks or as given, little group, irreps, modes, satellites",
    argument: "study",
    options: [...wholeJobOptions, "json", "folder", "force", "quiet"],
    examples: ["kvane run --example", "kvane run --example --k 0,0,1/2"],
  },
  {
    name: "weigh",
    summary: "rank configurations by how well they fit intensities; a ranking is not a refinement",
    argument: "study",
    options: [
      "structure",
      "block",
      "example",
      "k",
      "intensities",
      "as",
      "wavelength",
      "lorentz",
      "scale",
      "resolution",
      "arms",
      "together",
      "onSites",
      "limit",
      "csv",
      ...outputOptions,
    ],
    examples: ["kvane weigh --example"],
  },
  {
    name: "report",
    summary: "the report of the whole job alone: --out FILE ending in .html, .md, .txt or .json",
    argument: "study",
    options: [...wholeJobOptions, ...outputOptions],
    examples: ["kvane report --example"],
  },
  {
    name: "study",
    summary: "write a commented study to start from",
    argument: "cif",
    options: ["block", "example", ...outputOptions],
    examples: ["kvane study --example"],
  },
  {
    name: "check",
    summary: "validate a study and the files it names, or read any CIF",
    argument: "study",
    options: ["structure", "block", "syntax", "example", "json", "out", "force", "quiet"],
    examples: ["kvane check --example"],
  },
];
