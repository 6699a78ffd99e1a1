import type { CommandSpec } from "./command-spec.js";

/** What a parsed line holds: the command, its first word and its options, by the attribute names of the options. */
export interface ParsedLine {
  readonly spec: CommandSpec;
  readonly argument: string | null;
  readonly options: { readonly [attribute: string]: unknown };
}
