import type { PeakKind } from "../search/index.js";
import { peakKindWords, readPeakKind } from "./peak-kind.js";
import { unitFactor, unitNames } from "./peak-units.js";
import { note, type ProblemList } from "./problem-list.js";
import { openSection } from "./study-section.js";
import type { StudyPeaks, StudySearch } from "./study-types.js";
import { asFlag, asNumber, asRecord, asText, describe, type NumberLimits, noteNumber } from "./study-values.js";
import { where } from "./yaml-convert.js";
import type { TreeNode } from "./yaml-tree.js";

export const positive = (expected: string): NumberLimits => ({ expected, allows: (value) => value > 0 });
const notNegative = (expected: string): NumberLimits => ({ expected, allows: (value) => value >= 0 });

/** `peaks: {file, as, wavelength, tolerance, unit, nuclear}`; the file is needed. */
export function readPeaks(node: TreeNode, problems: ProblemList): StudyPeaks | null {
  const example = "for example peaks: {file: satellites.csv, as: two-theta, wavelength: 2.41}";
  const record = asRecord(problems, node, "a section with `file`", example);
  if (!record) return null;
  const section = openSection("peaks", record, problems);
  const number = (key: string, limits: NumberLimits) => {
    const value = section.get(key);
    return value && asNumber(problems, value, limits);
  };
  const fileNode = section.need("file", "the name of the peak list");
  const file = fileNode && asText(problems, fileNode, "the name of the peak list");
  const as = section.get("as");
  const kind = as && readKind(as, problems);
  const wavelengthAngstrom = number("wavelength", positive("a wavelength in Å above 0"));
  const tolerance = number("tolerance", positive("a half-width above 0 in the unit of the positions"));
  const unit = section.get("unit");
  const unitText = unit && readUnit(unit, kind, problems);
  const nuclearNode = section.get("nuclear");
  const nuclear = nuclearNode && asText(problems, nuclearNode, "the name of a list of nuclear lines");
  return file === null ? null : { file, kind, wavelengthAngstrom, tolerance, unit: unitText, nuclear };
}

/** The word of an `as:` key. */
export function readKind(node: TreeNode, problems: ProblemList): PeakKind | null {
  const word = asText(problems, node, peakKindWords);
  if (word === null) return null;
  const kind = readPeakKind(word);
  if (!kind) {
    note(problems, "peak-kind-unknown", `\`${describe(node)}\` is no kind of position`, {
      where: where(node.place),
      expected: peakKindWords,
      found: describe(node),
      remedy: `write one of ${peakKindWords}`,
    });
  }
  return kind;
}

/** The unit as written; it is tried on the kind where the study says one, and by the peak list in any case. */
function readUnit(node: TreeNode, kind: PeakKind | null, problems: ProblemList): string | null {
  const unit = asText(problems, node, "a unit such as nm");
  if (unit !== null && kind && unitFactor(kind, unit) === null) {
    note(problems, "invalid-argument", `\`${describe(node)}\` is no unit for ${kind}`, {
      where: where(node.place),
      expected: unitNames(kind),
      found: describe(node),
      remedy: "correct the unit, or leave it out",
    });
  }
  return unit;
}

export const emptySearch: StudySearch = {
  unmatched: null,
  maxDimension: null,
  tolerance: null,
  zeroShift: null,
  cellScale: null,
  qMax: null,
  weighIntensities: null,
};

const wholeNumber: NumberLimits = {
  expected: "a whole number, 0 or more",
  allows: (value) => Number.isSafeInteger(value) && value >= 0,
};

/** `search: {unmatched, max-dimension, tolerance, zero-shift, cell-scale, q-max, weigh-intensities}`. */
export function readSearch(node: TreeNode, problems: ProblemList): StudySearch {
  const record = asRecord(problems, node, "a section with keys", "for example search: {unmatched: 1}");
  if (!record) return emptySearch;
  const section = openSection("search", record, problems);
  const number = (key: string, limits: NumberLimits) => {
    const value = section.get(key);
    return value && asNumber(problems, value, limits);
  };
  const dimension = section.get("max-dimension");
  const weigh = section.get("weigh-intensities");
  return {
    unmatched: number("unmatched", wholeNumber),
    maxDimension: dimension && readDimension(dimension, problems),
    tolerance: number("tolerance", positive("a half-width in 1/Å above 0")),
    zeroShift: number("zero-shift", notNegative("degrees 2theta, 0 or more")),
    cellScale: number("cell-scale", {
      expected: "a relative change of the cell from 0 to less than 1, such as 0.01",
      allows: (value) => value >= 0 && value < 1,
    }),
    qMax: number("q-max", positive("a Q in 1/Å above 0")),
    weighIntensities: weigh && asFlag(problems, weigh),
  };
}

function readDimension(node: TreeNode, problems: ProblemList): 0 | 1 | 2 | 3 | null {
  const expected = "0, 1, 2 or 3";
  const value = asNumber(problems, node, { expected, allows: () => true });
  if (value === 0 || value === 1 || value === 2 || value === 3) return value;
  if (value !== null && node.shape === "text") noteNumber(problems, node, expected);
  return null;
}
