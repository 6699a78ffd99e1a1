import type { ExplainRecord, HelpRecord } from "../records/simple.js";
import { fields, section, table } from "./layout.js";

export function explainText(record: ExplainRecord): string[] {
  const [only] = record.codes;
  if (record.codes.length === 1 && only)
    return section(
      only.code,
      fields([
        ["Meaning", only.meaning],
        ["Exit status", only.exitStatus === 0 ? "0: a warning, the answer stands" : String(only.exitStatus)],
        ...(only.remedy === null ? [] : [["Remedy", only.remedy] as const]),
      ]),
    );
  return section(
    "Codes of problems",
    table(
      [{ title: "code" }, { title: "exit", align: "right" }, { title: "meaning" }],
      record.codes.map((one) => [one.code, String(one.exitStatus), one.meaning]),
    ),
  );
}

export function helpText(record: HelpRecord): string[] {
  return [record.title, "", ...record.text.split("\n"), ""];
}
