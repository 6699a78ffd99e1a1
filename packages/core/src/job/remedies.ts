import type { Problem, ProblemCode } from "../errors/index.js";

/** What to do about a problem whose own room had no better word. */
const remedies: { readonly [code in ProblemCode]?: string } = {
  "invalid-site": 'write LABEL x y z with fractions or decimals, such as "Fe 0 0 1/2"',
  "invalid-cell": 'give "a b c alpha beta gamma", lengths in Å and angles in degrees',
  "cell-contradicts-group": "correct the cell, or give the group in the setting that the cell belongs to",
  "invalid-number": "give a plain number such as 2.41",
  "invalid-k": "give three fractions, decimals or forms in u, v, w, separated by commas: 0,1/2,0",
  "unknown-group": "`kvane help group` shows how a space group is written",
  "ambiguous-group": "add the code of the setting or origin behind a colon, such as :2 or :H",
  "not-a-group": "correct the operator named, or leave it out",
  "singular-basis": "give three new axes that do not lie in a plane",
  "conflicting-arguments": "leave one of the two out",
  "too-few-peaks": "give more peaks",
  "number-overflow": "write the number with fewer digits",
};

/** The problem with something to do: its own remedy, else a general one. */
export function withRemedy(one: Problem): Problem {
  const general = remedies[one.code] ?? `correct it; \`kvane explain ${one.code}\` says what the code means`;
  return one.remedy === null ? { ...one, remedy: general } : one;
}
