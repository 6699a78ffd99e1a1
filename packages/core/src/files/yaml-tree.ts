import type { ParsedNode } from "yaml";
import { note, type ProblemList } from "./problem-list.js";
import type { StudyPlace } from "./study-types.js";
import { convertNode } from "./yaml-convert.js";
import { yamlMessage } from "./yaml-messages.js";

/** A value of a YAML file. Scalars are the text that stands in the file, so that `1/3` and `0.30` mean what is written. */
export type TreeNode = TreeText | TreeList | TreeRecord | TreeNothing;

export interface TreeText {
  readonly shape: "text";
  readonly text: string;
  readonly place: StudyPlace;
}

export interface TreeList {
  readonly shape: "list";
  readonly items: readonly TreeNode[];
  readonly place: StudyPlace;
}

export interface TreeEntry {
  readonly key: string;
  readonly keyPlace: StudyPlace;
  readonly value: TreeNode;
}

export interface TreeRecord {
  readonly shape: "record";
  readonly entries: readonly TreeEntry[];
  readonly place: StudyPlace;
}

/** No value, `~` or `null`; also what stands for a value that was refused, which is noted already. */
export interface TreeNothing {
  readonly shape: "nothing";
  readonly refused: boolean;
  readonly place: StudyPlace;
}

/** A study is a page; whatever is longer is no study, and the time to read it stays bounded. */
const longestStudy = 200_000;

/**
 * Reads YAML 1.2 into a tree of text, lists and records with their places. What breaks the grammar is noted with line
 * and column, and then null comes back; aliases, tags and doubled keys are noted and the rest is read on. The yaml
 * package is loaded by the first call.
 *
 * @param text with `\n` line ends
 */
export async function readYamlTree(text: string, problems: ProblemList): Promise<TreeNode | null> {
  const top = { line: 1, column: 1 };
  if (text.length > longestStudy) {
    note(problems, "syntax", `the file has ${text.length} characters, too many for a study`, {
      where: top,
      expected: `a study of at most ${longestStudy} characters`,
      found: `${text.length} characters`,
      remedy: "check that this is the study file; peaks belong into a file of their own",
    });
    return null;
  }
  const yaml = await import("yaml");
  const lineCounter = new yaml.LineCounter();
  try {
    // "failsafe" leaves every scalar as its text; doubled keys are found by convertNode, in less than quadratic time.
    const document = yaml.parseDocument<ParsedNode, true>(text, {
      lineCounter,
      prettyErrors: false,
      schema: "failsafe",
      uniqueKeys: false,
    });
    // One slip makes the reader stumble over all that follows: only the first error means what it says.
    const [first] = document.errors;
    for (const { code, pos } of first ? [first] : document.warnings) {
      // What is missing at the end is missing behind the last word, not in the empty line below.
      const { line, col } = lineCounter.linePos(Math.min(pos[0], text.trimEnd().length));
      const said = yamlMessage(code);
      note(problems, "syntax", said.message, {
        where: { line, column: col },
        expected: "`key: value`, lists in brackets",
        ...said.details,
      });
    }
    if (document.errors.length > 0) return null;
    return document.contents ? convertNode({ yaml, lineCounter, text, problems }, document.contents, "") : null;
  } catch (error) {
    // What the YAML reader cannot stand (its stack is finite) is a fault of the file, not of ours.
    const found = error instanceof Error ? error.message : String(error);
    note(problems, "syntax", "the file cannot be read as YAML", { where: top, expected: "YAML", found });
    return null;
  }
}
