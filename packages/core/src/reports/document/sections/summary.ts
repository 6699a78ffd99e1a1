import { counted, kText } from "../../text/names.js";
import { type Block, fieldsBlock } from "../blocks.js";
import type { DocumentSource } from "../run-document.js";

/** The answer at a glance: which k, how sure, what to do next. */
export function summaryBlocks({ record, answer }: DocumentSource): Block[] {
  const { search, branches } = record;
  const warnings = answer.warnings.length;
  return [
    ...branches.map(({ k, candidate }): Block => {
      const one = candidate === null ? undefined : search?.candidates[candidate];
      if (one === undefined) return { kind: "note", tone: "good", text: `k = ${kText(k)}, as given.` };
      const found = one.evidence.reading === "found";
      const reading = { found: "found", weak: "weak evidence only", "not informative": "the peaks do not decide" };
      return {
        kind: "note",
        tone: found ? "good" : "warning",
        text: `k = ${kText(k)}: ${reading[one.evidence.reading]}; ${one.matched} of ${one.total} peaks matched.`,
      };
    }),
    ...(search !== null && branches.length === 0
      ? [{ kind: "note", tone: "warning", text: "No k of those searched explains enough of the peaks." } as const]
      : []),
    ...fieldsBlock([
      ...(record.next.length > 0 ? [["Next", record.next[0] as string] as const] : []),
      ...(record.notFollowed.length > 0
        ? [["Tied, not followed", `candidate ${record.notFollowed.map((index) => index + 1).join(", ")}`] as const]
        : []),
      ...(warnings > 0
        ? [["Warnings", `${counted(warnings, "warning")}, listed under “Warnings and cautions”`] as const]
        : []),
    ]),
  ];
}
