import type { OptionName } from "./options.js";

/** What the first word behind a command is. */
export type ArgumentKind =
  | "group or study"
  | "study"
  | "cif"
  | "moments"
  | "scan"
  | "code"
  | "topic"
  | "shell"
  | "requests";

/** A command as the command line shows it. */
export interface CommandSpec {
  readonly name: string;
  readonly summary: string;
  /** What it does not do yet, a sentence behind the summary on its own help page. */
  readonly limits?: string;
  readonly argument: ArgumentKind;
  readonly options: readonly OptionName[];
  /** Commands that work when pasted; a test pastes them. */
  readonly examples: readonly string[];
  /** Pages of `kvane help` that say more. */
  readonly topics?: readonly string[];
}
