import type { Problem } from "../../errors/index.js";
import type { AssumedRecord, Envelope } from "../records/common.js";
import type { ModesRecord } from "../records/modes.js";
import type { RunRecord } from "../records/run.js";
import { conventionSentence } from "./convention-text.js";
import { paragraph, section, table } from "./layout.js";

const operatorConventions = "Operators x' = Rx + t; k in the reciprocal basis of the setting; D(T) = exp(+2πi k·T).";

/** Which conventions the numbers above obey, once. */
export function conventionLines(answer: Envelope): string[] {
  return section("Conventions", ...conventionSentences(answer).map((text) => paragraph(text)));
}

/** The same, a text each. */
export function conventionSentences({ command, result }: Envelope): string[] {
  if (!["atlas", "star", "irreps", "compatibility", "modes", ...wholeJob].includes(command)) return [];
  const convention =
    command === "modes" ? (result as ModesRecord).convention : (result as RunRecord).branches?.[0]?.modes.convention;
  const withoutIrreps =
    ["atlas", "star"].includes(command) || (wholeJob.includes(command) && (result as RunRecord).branches.length === 0);
  return [
    `${operatorConventions}${convention ? ` ${conventionSentence(convention)}` : ""}`,
    ...(withoutIrreps ? [] : ["The numbers in Γ1, Γ2, … are kvane's own: an irrep is identified by its characters."]),
  ];
}

/** Commands that answer with the record of the whole job. */
const wholeJob = ["run", "report"];

const wholeJobCaution =
  "A k and its modes are hypotheses until a structure is refined against intensities. Powder positions cannot tell k from −k, arms of a star or several-k structures apart.";

const cautions: { readonly [command: string]: string } = {
  run: wholeJobCaution,
  report: wholeJobCaution,
  locate:
    "A k from positions is a hypothesis until a structure is refined against intensities. Powder positions cannot tell k from −k, arms of a star or several-k structures apart.",
};

/** What the result cannot say, once. */
export function cautionLines(command: string): string[] {
  const text = cautionText(command);
  return text === null ? [] : section("Caution", paragraph(text));
}

/** The same as one text; null where there is nothing to say. */
export function cautionText(command: string): string | null {
  return cautions[command] ?? null;
}

/** Everything that was taken without being said. */
export function assumedLines(assumed: readonly AssumedRecord[]): string[] {
  return section(
    "Assumed",
    assumed.length === 0
      ? []
      : table(
          [{ title: "what" }, { title: "taken as" }, { title: "because" }],
          assumed.map(({ what, value, because }) => [what, value, because]),
        ),
  );
}

/** Warnings, each with what to do. */
export function warningLines(warnings: readonly Problem[]): string[] {
  return section(
    "Warnings",
    warnings.flatMap((one) => paragraph(`${one.message}${one.remedy === null ? "" : `: ${one.remedy}`} [${one.code}]`)),
  );
}
