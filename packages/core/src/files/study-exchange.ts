import { note, type ProblemList } from "./problem-list.js";
import { openSection } from "./study-section.js";
import type { StudyCoupling, StudyRange } from "./study-types.js";
import { asList, asNumber, asRecord, asText, type NumberLimits } from "./study-values.js";
import { where } from "./yaml-convert.js";
import type { TreeNode, TreeRecord } from "./yaml-tree.js";

const finite: NumberLimits = { expected: "a number", allows: Number.isFinite };

const shellNumber: NumberLimits = {
  expected: "the number of a shell, counted from 1",
  allows: (value) => Number.isSafeInteger(value) && value >= 1,
};

const example = "for example - {shell: 1, j: 1.0} or - {bond: 2b, j: -0.3} or - {shell: 2, vary: [0, 1, 41]}";

/** `exchange: [{shell, j}, {bond, j}, {shell, between: [Fe1, Fe2], j}, {shell, j, vary: [from, to, count]}]`. */
export function readExchange(node: TreeNode, problems: ProblemList): StudyCoupling[] | null {
  const list = asList(problems, node, "a list of exchange constants", example);
  if (!list) return null;
  return list.items.flatMap((item) => {
    const record = asRecord(problems, item, "a constant with `shell` or `bond`, and `j`", example);
    if (!record) return [];
    const section = openSection("exchange", record, problems);
    const bond = readBond(record, section.get("shell"), section.get("bond"), problems);
    const betweenNode = section.get("between");
    const between = betweenNode && readBetween(betweenNode, problems);
    const varyNode = section.get("vary");
    const vary = varyNode && readRange(varyNode, problems);
    // A constant that runs need not have a value of its own.
    const jNode = varyNode ? section.get("j") : section.need("j", finite.expected);
    const j = jNode && asNumber(problems, jNode, finite);
    const missing = [jNode && j === null, betweenNode && between === null, varyNode && vary === null];
    return bond === null || missing.some((one) => one === true) || (j === null && vary === null)
      ? []
      : [{ bond, between, j, vary }];
  });
}

const valueCount: NumberLimits = {
  expected: "how many values, at least 2",
  allows: (value) => Number.isSafeInteger(value) && value >= 2,
};

/** `vary: [from, to]` or `vary: [from, to, count]`. */
function readRange(node: TreeNode, problems: ProblemList): StudyRange | null {
  const expected = "a range [from, to] or [from, to, count]";
  const remedy = "for example vary: [0, 1, 41]";
  const list = asList(problems, node, expected, remedy);
  if (!list) return null;
  const numbers = list.items.map((item, index) => asNumber(problems, item, index < 2 ? finite : valueCount));
  if (numbers.some((one) => one === null)) return null;
  const [from, to, count = null] = numbers;
  if (numbers.length <= 3 && from != null && to != null && from !== to) return { from, to, count };
  note(problems, "wrong-type", `\`${node.place.path}\` is not a range of a constant`, {
    where: where(node.place),
    expected: `${expected}, from and to not equal`,
    found: `[${numbers.join(", ")}]`,
    remedy,
  });
  return null;
}

function readBond(
  record: TreeRecord,
  shell: TreeNode | null,
  bond: TreeNode | null,
  problems: ProblemList,
): string | null {
  if ((shell === null) === (bond === null)) {
    const both = shell !== null;
    note(
      problems,
      both ? "conflicting-arguments" : "missing-key",
      `\`${record.place.path}\` needs \`shell\` or \`bond\``,
      {
        where: where((bond ?? record).place),
        expected: "the number of a shell, or one kind of its bonds such as 2b",
        found: both ? "both" : "neither",
        remedy: both ? "leave one of them out" : example,
      },
    );
    return null;
  }
  if (shell !== null) {
    const number = asNumber(problems, shell, shellNumber);
    return number === null ? null : String(number);
  }
  const text = asText(problems, bond as TreeNode, "a kind of bonds such as 2b");
  if (text === null || /^[1-9]\d*[a-z]*$/.test(text)) return text;
  note(problems, "wrong-type", `\`${text}\` is no kind of bonds`, {
    where: where((bond as TreeNode).place),
    expected: "the number of a shell and, where it has several kinds, a letter: 2b",
    found: text,
    remedy: "`kvane exchange` without constants lists the bonds with their names",
  });
  return null;
}

function readBetween(node: TreeNode, problems: ProblemList): readonly [string, string] | null {
  const expected = "two labels of sites such as [Fe1, Fe2]";
  const list = asList(problems, node, expected);
  if (!list) return null;
  const labels = list.items.map((item) => asText(problems, item, "the label of a site"));
  const [first, second] = labels;
  if (labels.length === 2 && first != null && second != null) return [first, second];
  if (labels.length !== 2)
    note(problems, "wrong-type", `\`${node.place.path}\` does not name two sites`, {
      where: where(node.place),
      expected,
      found: `${labels.length} labels`,
      remedy: "name the sites at both ends of the bonds",
    });
  return null;
}

/** `onset: {file}`. */
export function readOnset(node: TreeNode, problems: ProblemList): { readonly file: string } | null {
  const record = asRecord(problems, node, "a section with `file`", "for example onset: {file: scan.csv}");
  const fileNode = record && openSection("onset", record, problems).need("file", "the name of a file");
  const file = fileNode && asText(problems, fileNode, "the name of a file");
  return file === null ? null : { file };
}
