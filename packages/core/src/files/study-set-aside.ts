import { note, type ProblemList } from "./problem-list.js";
import { openSection } from "./study-section.js";
import { readCell } from "./study-structure.js";
import type { StudyImpurity } from "./study-types.js";
import { asList, asNumber, asRecord, asText, type NumberLimits } from "./study-values.js";
import { where } from "./yaml-convert.js";
import type { TreeNode } from "./yaml-tree.js";

const finite: NumberLimits = { expected: "a number", allows: () => true };

/** `exclude: [[from, to]]`. */
export function readExclude(node: TreeNode, problems: ProblemList): (readonly [number, number])[] | null {
  const example = "for example exclude: [[42.1, 42.9]]";
  const list = asList(problems, node, "a list of ranges [from, to]", example);
  if (!list) return null;
  return list.items.flatMap((item) => {
    const range = asList(problems, item, "a range [from, to]", example);
    if (!range) return [];
    const numbers = range.items.map((one) => asNumber(problems, one, finite));
    const [from, to] = numbers;
    if (numbers.some((one) => one === null)) return [];
    if (numbers.length === 2 && from != null && to != null && from < to) return [[from, to] as const];
    note(problems, "wrong-type", `\`${item.place.path}\` is not a range`, {
      where: where(item.place),
      expected: "two numbers, the smaller first",
      found: `[${numbers.join(", ")}]`,
      remedy: example,
    });
    return [];
  });
}

/** `impurities: [{name, group, cell}]`. */
export function readImpurities(node: TreeNode, problems: ProblemList): StudyImpurity[] {
  const example =
    "for example - {name: MnO, group: F m -3 m, cell: {a: 4.445, b: 4.445, c: 4.445, alpha: 90, beta: 90, gamma: 90}}";
  const list = asList(problems, node, "a list of other phases", example);
  if (!list) return [];
  return list.items.flatMap((item) => {
    const record = asRecord(problems, item, "a phase with name, group and cell", example);
    if (!record) return [];
    const section = openSection("impurities", record, problems);
    const nameNode = section.need("name", "what the phase is called");
    const groupNode = section.need("group", "its space group");
    const cellNode = section.need("cell", "its cell");
    const name = nameNode && asText(problems, nameNode, "what the phase is called");
    const group = groupNode && asText(problems, groupNode, "a space group such as F m -3 m");
    const cell = cellNode && readCell(cellNode, problems);
    return name === null || group === null || cell === null ? [] : [{ name, group, cell }];
  });
}
