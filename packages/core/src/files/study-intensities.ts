import { largestMeasured } from "../numbers/index.js";
import { note, type ProblemList } from "./problem-list.js";
import { positive, readKind } from "./study-peaks.js";
import { openSection } from "./study-section.js";
import type { StudyIntensities } from "./study-types.js";
import { asFlag, asNumber, asRecord, asText, type NumberLimits } from "./study-values.js";
import { where } from "./yaml-convert.js";
import type { TreeNode } from "./yaml-tree.js";

/** `intensities: {file, as, wavelength, …}`, all keys of `studyKeys`; the file is needed. */
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
  const flag = (key: string) => {
    const value = section.get(key);
    return value && asFlag(problems, value);
  };
  const nuclearNode = section.get("nuclear");
  const nuclear = nuclearNode && asText(problems, nuclearNode, "the name of a list of nuclear lines");
  const as = section.get("as");
  const kind = as && readKind(as, problems);
  const wavelengthAngstrom = number("wavelength", positive("a wavelength in Å above 0"));
  const lorentz = flag("lorentz");
  const includesNuclear = flag("includes-nuclear");
  const domainsNode = section.get("domains");
  const domains = domainsNode && readDomains(domainsNode, problems);
  const scale = number("scale", {
    expected: `the intensity of |F|² = 1 (10⁻²⁴ cm²), above 0 and up to ${largestMeasured}`,
    allows: (value) => value > 0 && value <= largestMeasured,
  });
  const resolution = number("resolution", positive("a distance in 1/Å above 0"));
  const displacement = number("displacement", {
    expected: "an overall B in Å², 0 or more",
    allows: (value) => value >= 0,
  });
  const scatteringAngleDeg = number("scattering-angle", {
    expected: "2theta of the detectors in degrees, above 0 and below 180",
    allows: (value) => value > 0 && value < 180,
  });
  const patternWidthDeg = number("pattern-width", positive("a full width at half maximum in degrees 2theta above 0"));
  if (file === null) return null;
  return {
    file,
    kind,
    wavelengthAngstrom,
    lorentz,
    scale,
    resolution,
    nuclear,
    includesNuclear,
    displacement,
    scatteringAngleDeg,
    domains,
    patternWidthDeg,
  };
}

function readDomains(node: TreeNode, problems: ProblemList): StudyIntensities["domains"] {
  const word = asText(problems, node, "equal or free");
  if (word === "equal" || word === "free") return word;
  if (word !== null)
    note(problems, "invalid-argument", `\`${word}\` does not say what the fractions of domains are`, {
      where: where(node.place),
      expected: "equal or free",
      found: word,
      remedy: "write `domains: free` to fit the fractions",
    });
  return null;
}
