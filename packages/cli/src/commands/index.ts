import type { CommandSpec } from "../command-spec.js";
import { batchCommands } from "./batch-command.js";
import { helpCommands } from "./help-commands.js";
import { peakCommands } from "./peak-commands.js";
import { physicsCommands } from "./physics-commands.js";
import { studyCommands } from "./study-commands.js";
import { symmetryCommands } from "./symmetry-commands.js";

/** All commands of this version, in the order of the manual. */
export const commandSpecs: readonly CommandSpec[] = [
  ...studyCommands,
  ...symmetryCommands,
  ...peakCommands,
  ...physicsCommands,
  ...batchCommands,
  ...helpCommands,
];
