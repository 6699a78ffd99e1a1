import type { CommandSpec } from "../command-spec.js";
import { outputOptions } from "../options.js";

/** What exchange constants and temperature say of k. */
export const physicsCommands: readonly CommandSpec[] = [
  {
    name: "exchange",
    summary: "shells of neighbours and the k that exchange constants prefer",
    argument: "group or study",
    options: [
      "structure",
      "block",
      "cell",
      "sites",
      "k",
      "constants",
      "vary",
      "shells",
      "example",
      "csv",
      "svg",
      ...outputOptions,
    ],
    examples: [
      'kvane exchange "P 4/m m m" --cell "4 4 10 90 90 90" --site "M 0 0 0" --j "1 1.0" --j "2 0.6"',
      'kvane exchange "P 4/m m m" --cell "4 4 10 90 90 90" --site "M 0 0 0" --j "1 1" --vary "2 0 1 11"',
      "kvane exchange --example",
    ],
    topics: ["bonds"],
  },
  {
    name: "onset",
    summary: "onset of peaks in a temperature scan, common transitions, movement of k",
    argument: "scan",
    options: ["reduced", "example", "csv", "svg", ...outputOptions],
    examples: ["kvane onset --example", "kvane onset --example --svg"],
    topics: ["scan"],
  },
];
