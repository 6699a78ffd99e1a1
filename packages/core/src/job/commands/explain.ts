import { fail, nearMiss, type ProblemCode, problemCodes } from "../../errors/index.js";
import type { ExplainRecord } from "../../reports/index.js";
import { exitStatusOf } from "../exit-status.js";
import { optionOf } from "../inputs/given.js";
import { generalRemedy } from "../remedies.js";
import type { Work } from "../work.js";

/** `kvane explain`: what a code of a problem means; all of them when none is named. */
export function explainCommand({ request }: Work): ExplainRecord {
  const codes = Object.keys(problemCodes) as ProblemCode[];
  const given = optionOf(request, "code");
  const wanted = given === null ? codes : codes.filter((code) => code === given.text.toLowerCase());
  if (wanted.length === 0 && given !== null) {
    const near = nearMiss(given.text, codes);
    fail("invalid-argument", `there is no code \`${given.text}\``, {
      where: given.where,
      expected: "a code such as cell-contradicts-group",
      found: given.text,
      remedy: near === null ? "`kvane explain` alone lists all codes" : `did you mean \`${near}\`?`,
    });
  }
  return {
    codes: wanted.map((code) => ({
      code,
      meaning: problemCodes[code],
      exitStatus: exitStatusOf(code),
      remedy: generalRemedy(code),
    })),
  };
}
