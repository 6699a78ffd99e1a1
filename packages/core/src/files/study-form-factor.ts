import type { ProblemList } from "./problem-list.js";
import { openSection } from "./study-section.js";
import type { StudyCoefficients, StudyFormFactor } from "./study-types.js";
import { asList, asNumber, asRecord, noteType } from "./study-values.js";
import type { TreeNode } from "./yaml-tree.js";

const expected = "a constant such as 1, or coefficients {j0: [A, a, B, b, C, c, D]}";
const anyNumber = { expected: "a number", allows: () => true };

/** `form-factor: 1` or `form-factor: {j0: […], j2: […], j2-factor: …}`. */
export function readFormFactor(node: TreeNode, problems: ProblemList): StudyFormFactor | null {
  if (node.shape === "text") {
    const constant = asNumber(problems, node, { expected, allows: () => true });
    return constant === null ? null : { constant };
  }
  const record = asRecord(problems, node, expected);
  if (!record) return null;
  const section = openSection("form-factor", record, problems);
  const j0Node = section.need("j0", "seven numbers A, a, B, b, C, c, D");
  const j0 = j0Node && readCoefficients(j0Node, problems);
  const j2Node = section.get("j2");
  const j2 = j2Node && readCoefficients(j2Node, problems);
  const factorNode = j2Node ? section.need("j2-factor", "the factor of <j2>, such as 0.1") : section.get("j2-factor");
  const j2Factor = factorNode && asNumber(problems, factorNode, anyNumber);
  if (j0 === null || (j2Node && (j2 === null || j2Factor === null))) return null;
  return j2 === null ? { j0 } : { j0, j2, ...(j2Factor === null ? {} : { j2Factor }) };
}

function readCoefficients(node: TreeNode, problems: ProblemList): StudyCoefficients | null {
  const seven = "seven numbers [A, a, B, b, C, c, D]";
  const list = asList(problems, node, seven);
  if (!list) return null;
  if (list.items.length !== 7) {
    noteType(problems, list, seven, `write seven numbers, not ${list.items.length}`);
    return null;
  }
  const values = list.items.map((item) => asNumber(problems, item, anyNumber));
  return values.includes(null) ? null : (values as unknown as StudyCoefficients);
}
