import type { Rational, RationalVector } from "../numbers/index.js";
import type { Cell } from "../spacegroups/index.js";
import { ionFault } from "./ion-names.js";
import { note, type ProblemList } from "./problem-list.js";
import { readFormFactor } from "./study-form-factor.js";
import { positive } from "./study-peaks.js";
import { openSection } from "./study-section.js";
import type { StudyAtom, StudySite } from "./study-types.js";
import {
  asList,
  asNumber,
  asRational,
  asRecord,
  asText,
  type NumberLimits,
  noteNumber,
  noteType,
} from "./study-values.js";
import { where } from "./yaml-convert.js";
import type { TreeNode } from "./yaml-tree.js";

/** `structure: FILE.cif` or `structure: {file, block}`; a file name alone where it has one structure. */
export function readStructureFile(
  node: TreeNode,
  problems: ProblemList,
): { readonly file: string; readonly block: string | null } | null {
  if (node.shape !== "record") {
    const file = asText(problems, node, "the name of a CIF");
    return file === null ? null : { file, block: null };
  }
  const section = openSection("structure", node, problems);
  const fileNode = section.need("file", "the name of a CIF");
  const file = fileNode && asText(problems, fileNode, "the name of a CIF");
  const blockNode = section.get("block");
  const block = blockNode && asText(problems, blockNode, "the name of a data block");
  return file === null ? null : { file, block };
}

const length: NumberLimits = { expected: "a length in Å above 0", allows: (value) => value > 0, code: "invalid-cell" };

const angle: NumberLimits = {
  expected: "an angle in degrees between 0 and 180",
  allows: (value) => value > 0 && value < 180,
  code: "invalid-cell",
};

const cellExample = "for example cell: {a: 8.1, b: 6.2, c: 5.3, alpha: 90, beta: 90, gamma: 90}";

/** `cell: {a, b, c, alpha, beta, gamma}`, all six. */
export function readCell(node: TreeNode, problems: ProblemList): Cell | null {
  const record = asRecord(problems, node, "six keys a, b, c, alpha, beta, gamma", cellExample);
  if (!record) return null;
  const section = openSection("cell", record, problems);
  const read = (key: string, limits: NumberLimits) => {
    const value = section.need(key, limits.expected);
    return value && asNumber(problems, value, limits);
  };
  const [a, b, c] = [read("a", length), read("b", length), read("c", length)];
  const [alpha, beta, gamma] = [read("alpha", angle), read("beta", angle), read("gamma", angle)];
  if (a === null || b === null || c === null || alpha === null || beta === null || gamma === null) return null;
  return { a, b, c, alpha, beta, gamma };
}

const siteExample = "for example - {label: Fe1, ion: Fe3+, at: [0, 0, 0], spin: 5/2}";

/** `sites: [{label, ion, at, spin, g, form-factor, occupancy}]`: labels that differ, exact coordinates. */
export function readSites(node: TreeNode, problems: ProblemList): StudySite[] {
  const list = asList(problems, node, "a list of sites", siteExample);
  if (!list) return [];
  if (list.items.length === 0) noteType(problems, list, "a list of at least one site", siteExample);
  const lineOfLabel = new Map<string, number | null>();
  return list.items.flatMap((item) => readSite(item, lineOfLabel, problems) ?? []);
}

function readSite(node: TreeNode, lineOfLabel: Map<string, number | null>, problems: ProblemList): StudySite | null {
  const record = asRecord(problems, node, "a site with label and at", siteExample);
  if (!record) return null;
  const section = openSection("sites", record, problems);
  const label = readLabel(section.need("label", "the name of the site, such as Fe1"), lineOfLabel, problems);
  const at = section.need("at", "three coordinates such as [0, 1/4, 0.183]");
  const position = at && readPosition(at, problems);
  const ion = section.get("ion");
  const ionText = ion && readIon(ion, problems);
  const spin = section.get("spin");
  const spinValue = spin && readSpin(spin, problems);
  const gNode = section.get("g");
  const g = gNode && asNumber(problems, gNode, positive("a g factor above 0, such as 2.1"));
  const factorNode = section.get("form-factor");
  const formFactor = factorNode && readFormFactor(factorNode, problems);
  const occupancy = readOccupancy(section.get("occupancy"), problems);
  return label !== null && position
    ? { label, ion: ionText, position, spin: spinValue, g, formFactor, occupancy }
    : null;
}

const atomExample = "for example - {label: O1, ion: O2-, at: [0.412, 1/4, 0.118], occupancy: 1}";

/** `atoms: [{label, ion, at, occupancy}]`: what carries no moment. */
export function readAtoms(node: TreeNode, problems: ProblemList): StudyAtom[] {
  const list = asList(problems, node, "a list of atoms", atomExample);
  if (!list) return [];
  const lineOfLabel = new Map<string, number | null>();
  return list.items.flatMap((item) => {
    const record = asRecord(problems, item, "an atom with label and at", atomExample);
    if (!record) return [];
    const section = openSection("atoms", record, problems);
    const label = readLabel(section.need("label", "the name of the atom, such as O1"), lineOfLabel, problems);
    const at = section.need("at", "three coordinates such as [0, 1/4, 0.183]");
    const position = at && readPosition(at, problems);
    const ion = section.get("ion");
    const ionText = ion && readIon(ion, problems);
    const occupancy = readOccupancy(section.get("occupancy"), problems);
    return label !== null && position ? [{ label, ion: ionText, position, occupancy }] : [];
  });
}

const share: NumberLimits = { expected: "a share above 0, at most 1", allows: (value) => value > 0 && value <= 1 };

function readOccupancy(node: TreeNode | null, problems: ProblemList): number | null {
  return node && asNumber(problems, node, share);
}

function readIon(node: TreeNode, problems: ProblemList): string | null {
  const expected = "an element and its charge, such as Fe3+";
  const text = asText(problems, node, expected);
  const fault = text === null ? null : ionFault(text);
  if (fault === null) return text;
  note(problems, "invalid-site", fault.message, {
    where: where(node.place),
    expected,
    found: text ?? "",
    remedy: fault.remedy,
  });
  return null;
}

function readLabel(
  node: TreeNode | null,
  lineOfLabel: Map<string, number | null>,
  problems: ProblemList,
): string | null {
  const label = node && asText(problems, node, "the name of the site, such as Fe1");
  if (!node || label === null) return null;
  if (/\s/.test(label)) {
    note(problems, "invalid-site", `the label \`${label}\` has a blank in it`, {
      where: where(node.place),
      expected: "a label without blanks",
      found: label,
      remedy: `write ${label.replace(/\s+/g, "_")}`,
    });
    return null;
  }
  const earlier = lineOfLabel.get(label);
  if (earlier !== undefined) {
    note(problems, "duplicate-site", `the label \`${label}\` is taken already`, {
      where: where(node.place),
      expected: "labels that differ",
      found: `${label}, which line ${earlier} has already`,
      remedy: "give the second site another label",
    });
  }
  lineOfLabel.set(label, earlier ?? node.place.line);
  return label;
}

function readPosition(node: TreeNode, problems: ProblemList): RationalVector | null {
  const expected = "three coordinates such as [0, 1/4, 0.183]";
  const list = asList(problems, node, expected);
  if (!list) return null;
  if (list.items.length !== 3) {
    note(problems, "invalid-site", `\`${node.place.path}\` has ${list.items.length} coordinates instead of three`, {
      where: where(node.place),
      expected,
      found: `${list.items.length} values`,
      remedy: list.items.length > 3 ? "write decimal points, not commas, within a number" : "write x, y and z",
    });
    return null;
  }
  const [x, y, z] = list.items.map((item) => asRational(problems, item, "a fraction or decimal such as 1/4 or 0.183"));
  return x && y && z ? [x, y, z] : null;
}

function readSpin(node: TreeNode, problems: ProblemList): Rational | null {
  const expected = "a spin quantum number such as 5/2";
  const spin = asRational(problems, node, expected);
  if (!spin || (spin[0] > 0 && spin[1] <= 2)) return spin;
  if (node.shape === "text") noteNumber(problems, node, expected);
  return null;
}
