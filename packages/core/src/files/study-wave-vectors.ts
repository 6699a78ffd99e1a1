import type { ProblemList } from "./problem-list.js";
import type { StudyPlace } from "./study-types.js";
import { noteType } from "./study-values.js";
import type { TreeList, TreeNode, TreeText } from "./yaml-tree.js";

/** A wave vector as text for `parseWaveVector`, and where that text stands. */
export interface StudyWaveVector {
  readonly text: string;
  readonly place: StudyPlace;
}

const expected = "one or more wave vectors such as [[0, 1/2, 0]]";

/**
 * `k:` is a list of wave vectors, each three components or one text `"0,1/2,0"`. A single one need not stand in a list
 * of its own: `k: [0, 1/2, 0]` and `k: 0,1/2,0` cannot be read otherwise.
 */
export function readWaveVectors(node: TreeNode, problems: ProblemList): StudyWaveVector[] {
  const several = node.shape === "list" && !componentsOf(node) ? node.items : [node];
  return several.flatMap((item) => readWaveVector(item, problems) ?? []);
}

function readWaveVector(node: TreeNode, problems: ProblemList): StudyWaveVector | null {
  if (node.shape === "text" && node.text.includes(",")) return { text: node.text, place: node.place };
  const components = node.shape === "list" ? componentsOf(node) : null;
  if (components?.length === 3) return joined(components, node.place);
  const form = node.place.path === "k" ? expected : "three components such as [0, 1/2, 0]";
  const empty = node.shape === "list" && node.items.length === 0;
  noteType(problems, node, form, empty ? "leave `k` out to have it searched" : "for example k: [[0, 1/2, 0]]");
  return null;
}

/** The items of a list that holds components of one wave vector, not wave vectors; else null. */
function componentsOf(list: TreeList): readonly TreeText[] | null {
  const components = list.items.flatMap((item) => (item.shape === "text" && !item.text.includes(",") ? [item] : []));
  return components.length === list.items.length ? components : null;
}

/**
 * Three components as one text. Where they stand in one line, blanks keep every component at its distance, so that a
 * column of the text is a column of the file.
 */
function joined(components: readonly TreeText[], place: StudyPlace): StudyWaveVector {
  const [first] = components;
  const aligned = first && components.every((one) => one.place.verbatim && one.place.line === first.place.line);
  if (!aligned) return { text: components.map(({ text }) => text).join(", "), place: { ...place, verbatim: false } };
  const start = first.place.column ?? 1;
  const text = components.reduce((line, { text, place: { column } }, index) => {
    return index === 0 ? text : `${line},`.padEnd((column ?? 1) - start) + text;
  }, "");
  return { text, place: first.place };
}
