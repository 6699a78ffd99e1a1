import type { ProblemList } from "./problem-list.js";
import { positive, readKind } from "./study-peaks.js";
import { openSection } from "./study-section.js";
import type { StudyIntensities } from "./study-types.js";
import { asFlag, asNumber, asRecord, asText, type NumberLimits } from "./study-values.js";
import type { TreeNode } from "./yaml-tree.js";

/** `intensities: {file, as, wavelength, lorentz, scale, resolution}`; the file is needed. */
export function readIntensities(node: TreeNode, problems: ProblemList): StudyIntensities | null {
  const record = asRecord(problems, node, "a section with `file`", "for example intensities: {file: integrated.csv}");
  if (!record) return null;
  const section = openSection("intensities", record, problems);
  const number = (key: string, limits: NumberLimits) => {
    const value = section.get(key);
    return value && asNumber(problems, value, limits);
  };
  const fileNode = section.need("file", "the name of a list of intensities");
  const file = fileNode && asText(problems, fileNode, "the name of a list of intensities");
  const as = section.get("as");
  const lorentzNode = section.get("lorentz");
  const kind = as && readKind(as, problems);
  const wavelengthAngstrom = number("wavelength", positive("a wavelength in Å above 0"));
  const lorentz = lorentzNode && asFlag(problems, lorentzNode);
  const scale = number("scale", positive("the intensity of |F|² = 1 (10⁻²⁴ cm²), above 0"));
  const resolution = number("resolution", positive("a distance in 1/Å above 0"));
  return file === null ? null : { file, kind, wavelengthAngstrom, lorentz, scale, resolution };
}
