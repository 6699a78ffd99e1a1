import type { CommandSpec } from "../command-spec.js";
import { outputOptions } from "../options.js";

const peakOptions = [
  "peaks",
  "as",
  "wavelength",
  "tolerance",
  "unmatched",
  "qMax",
  "exclude",
  "impurities",
  "nuclear",
  "weighIntensities",
] as const;

/** Between peaks and k. */
export const peakCommands: readonly CommandSpec[] = [
  {
    name: "satellites",
    summary: "list of satellites and what lies on them",
    argument: "group or study",
    options: ["structure", "block", "cell", "k", "sites", "qMax", "wavelength", "example", "csv", ...outputOptions],
    examples: [
      'kvane satellites 62 --cell "10.21 6.05 4.71 90 90 90" --k 0,1/2,0 --q-max 2 --wavelength 2.41',
      'kvane satellites 62 --cell "10.21 6.05 4.71 90 90 90" --k 0,1/2,0 --site "Fe 0 0 1/2" --q-max 2',
    ],
  },
  {
    name: "index",
    summary: "assign peaks to satellites of a given k, residuals, refined k",
    argument: "group or study",
    options: [
      "structure",
      "block",
      "cell",
      "k",
      ...peakOptions,
      "zeroShift",
      "cellScale",
      "example",
      "csv",
      ...outputOptions,
    ],
    examples: ["kvane index --example --k 0,0,1/2"],
  },
  {
    name: "locate",
    summary: "certified search for k",
    argument: "group or study",
    options: [
      "structure",
      "block",
      "cell",
      ...peakOptions,
      "maxDimension",
      "zeroShift",
      "cellScale",
      "example",
      "csv",
      ...outputOptions,
    ],
    examples: ["kvane locate --example"],
  },
];
