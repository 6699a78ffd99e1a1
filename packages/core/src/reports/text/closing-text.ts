import type { Problem } from "../../errors/index.js";
import type { AssumedRecord } from "../records/common.js";
import { paragraph, section, table } from "./layout.js";

const conventions =
  "Conventions: operators x' = Rx + t; k in the reciprocal basis of the setting; D(T) = exp(+2πi k·T).";
const momentConventions =
  "M_j(T) = S_j exp(−2πi k·T) + c.c., without a factor 1/2 (S_j real and without c.c. where 2k is a reciprocal lattice vector); phases run with lattice translations T only; components along a, b, c.";

/** Which conventions the numbers above obey, once. */
export function conventionLines(command: string): string[] {
  if (!["star", "irreps", "modes", "run"].includes(command)) return [];
  const moments = command === "modes" || command === "run";
  return section(
    "Conventions",
    paragraph(`${conventions.replace("Conventions: o", "O")}${moments ? ` ${momentConventions}` : ""}`),
  );
}

const cautions: { readonly [command: string]: string } = {
  run: "A k and its modes are hypotheses until a structure is refined against intensities. Powder positions cannot tell k from −k, arms of a star or several-k structures apart.",
  locate:
    "A k from positions is a hypothesis until a structure is refined against intensities. Powder positions cannot tell k from −k, arms of a star or several-k structures apart.",
};

/** What the result cannot say, once. */
export function cautionLines(command: string): string[] {
  const text = cautions[command];
  return text === undefined ? [] : section("Caution", paragraph(text));
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
