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
  "unknown-command": "`kvane --help` lists the commands",
  "unknown-option": "`kvane COMMAND --help` lists the options, such as `kvane locate --help`",
  "missing-argument": "give it; `kvane COMMAND --help` shows an example that works",
  syntax: "look at the column that the caret points to",
  "duplicate-site": "leave one of the two sites out, or give it another label",
  "k-needs-values": "give numbers in place of the letters: 0,0.472,0 for 0,u,0",
  "k-not-on-manifold": "name the line or plane by an arm that holds the point: --from 0,0,0 --to 0,u,0",
  "measured-k-ambiguous": "write the fraction where the special value is meant: 1/3 instead of 0.333",
  "file-not-found": "check the name; a name in a study counts from the folder of the study",
  "file-unreadable": "save the file as plain text in UTF-8",
  "file-too-large": "cut out the part that is meant",
  "cif-syntax": "mend the line, or the one before; `kvane check FILE.cif --syntax` names all that is wrong",
  "cif-characters": "remove the characters, or save the file as a CIF 2.0 in UTF-8",
  "cif-incomplete": "write the value that is missing, or ? where it is not known",
  "cif-duplicate": "leave one of the two out",
  "cif-block": "choose the data block: --block NAME",
  "cif-missing": "add it to the CIF, or give it beside the CIF: GROUP, --cell, --site",
  "cif-value": "correct the value",
  "cif-contradiction": "check which of the two is right",
  "cif-doubtful": "look at the sites named",
  "output-exists": "give another name, or --force to replace what is there",
  "output-failed": "make the folder first, or choose another place",
  "unknown-key": "`kvane help study-file` shows the keys of a study",
  "missing-key": "`kvane help study-file` shows a whole study",
  "peak-kind-unknown": "say it: --as d, q, two-theta or hkl, `as:` in the study, or a header row",
  "missing-wavelength": "give --wavelength 2.41, or `wavelength: 2.41` beside the peaks of the study",
  "peak-out-of-range": "check the wavelength, the unit and what the positions are",
  "k-not-determined": "give peaks whose positions depend on every letter of k",
  "uncertainties-understated": "check the cell, the zero of the angle and the uncertainties",
  "no-candidate": "raise --unmatched or --tolerance, look for peaks that are not magnetic, or check the cell",
  interrupted: "start the command again; nothing was written",
  "number-overflow": "write the number with fewer digits",
};

/** What mostly helps with a code, or null. */
export function generalRemedy(code: ProblemCode): string | null {
  return remedies[code] ?? null;
}

/** The problem with something to do: its own remedy, else a general one. */
export function withRemedy(one: Problem): Problem {
  const general = remedies[one.code] ?? `correct it; \`kvane explain ${one.code}\` says what the code means`;
  return one.remedy === null ? { ...one, remedy: general } : one;
}
