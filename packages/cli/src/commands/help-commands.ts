import type { CommandSpec } from "../command-spec.js";

/** What things mean. */
export const helpCommands: readonly CommandSpec[] = [
  {
    name: "explain",
    summary: "what the code of a problem means",
    argument: "code",
    options: ["json"],
    examples: ["kvane explain cell-contradicts-group"],
  },
  {
    name: "help",
    summary: "conventions and formats",
    argument: "topic",
    options: ["json"],
    examples: ["kvane help conventions"],
  },
  {
    name: "completion",
    summary: "completion of commands and options for bash, zsh or fish",
    argument: "shell",
    options: [],
    examples: ["kvane completion bash"],
  },
];
