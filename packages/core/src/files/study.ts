import { note, type ProblemList, problemList, throwProblems } from "./problem-list.js";
import { readableText } from "./readable-text.js";
import { readExchange, readOnset } from "./study-exchange.js";
import { readIntensities } from "./study-intensities.js";
import { checkMeaning } from "./study-meaning.js";
import { emptySearch, readPeaks, readSearch } from "./study-peaks.js";
import { openSection, type Section } from "./study-section.js";
import { readExclude, readImpurities } from "./study-set-aside.js";
import { readAtoms, readCell, readSites, readStructureFile } from "./study-structure.js";
import type { Study, StudyPlace } from "./study-types.js";
import { asRecord, asText } from "./study-values.js";
import { readWaveVectors } from "./study-wave-vectors.js";
import { where } from "./yaml-convert.js";
import { readYamlTree, type TreeNode } from "./yaml-tree.js";

/**
 * Reads a study file (YAML 1.2; the manual page on the study file has its keys). Numbers are taken from the text of the
 * file: coordinates and spins exactly as written, lengths, angles and positions as floats. Sections that are left out
 * are null: what a job needs, the job asks for.
 *
 * Throws all problems of the file at once, each with line, column and path: `file-empty`, `file-unreadable`, `syntax`,
 * `unknown-key` with the likely key, `missing-key`, `wrong-type`, `invalid-number`, `number-overflow`, `invalid-cell`,
 * `cell-contradicts-group`, `invalid-site`, `duplicate-site`, `invalid-k`, `peak-kind-unknown`, `invalid-argument`,
 * `conflicting-arguments`, and what `parseGroup` says about the group.
 *
 * @param file name of the file, for messages
 */
export async function parseStudy(text: string, file: string): Promise<Study> {
  const problems = problemList(file);
  const plain = readableText(text, file);
  const tree = await readYamlTree(plain, problems);
  if (!tree) {
    noteEmpty(problems);
    throwProblems(problems);
  }
  const record = tree && asRecord(problems, tree, "a list of `key: value`", "begin with title: and group:");
  const section = record && openSection("", record, problems);
  const study = section && readStudy(section, file, placesOf(tree), problems);
  if (study) checkMeaning(study, problems);
  throwProblems(problems);
  return study as Study;
}

/** A file of comments alone has no tree and no problem. */
function noteEmpty(problems: ProblemList): void {
  if (problems.listed.length > 0) return;
  note(problems, "file-empty", "the study holds nothing but comments", {
    where: { line: 1, column: 1 },
    expected: "the keys of a study, such as group, cell, sites and peaks",
    found: "nothing",
    remedy: "take the # away from the lines that are meant",
  });
}

function readStudy(section: Section, file: string, places: Map<string, StudyPlace>, problems: ProblemList): Study {
  const read = <T>(key: string, reader: (node: TreeNode, problems: ProblemList) => T): T | null => {
    const node = section.get(key);
    return node && reader(node, problems);
  };
  const text = (key: string, expected: string) => read(key, (node) => asText(problems, node, expected));
  const structure = section.get("structure");
  for (const key of ["group", "cell"]) {
    const node = section.get(key);
    if (structure && node) noteConflict(key, node, problems);
  }
  const cif = read("structure", readStructureFile);
  const k = read("k", readWaveVectors);
  for (const [index, { place }] of k?.entries() ?? []) places.set(`k[${index}]`, { ...place, path: `k[${index}]` });
  return {
    file,
    title: text("title", "a title"),
    structure: cif?.file ?? null,
    structureBlock: cif?.block ?? null,
    group: text("group", "a space group such as P n m a"),
    cell: read("cell", readCell),
    sites: read("sites", readSites) ?? [],
    atoms: read("atoms", readAtoms) ?? [],
    k: k?.map((one) => one.text) ?? null,
    peaks: read("peaks", readPeaks),
    search: read("search", readSearch) ?? emptySearch,
    intensities: read("intensities", readIntensities),
    exchange: read("exchange", readExchange),
    onset: read("onset", readOnset),
    exclude: read("exclude", readExclude),
    impurities: read("impurities", readImpurities) ?? [],
    places: Object.fromEntries(places),
    warnings: [],
  };
}

function noteConflict(key: string, node: TreeNode, problems: ProblemList): void {
  note(problems, "conflicting-arguments", `\`structure\` and \`${key}\` are both given`, {
    where: where(node.place),
    expected: "a CIF, or group, cell and sites",
    found: "both",
    remedy: `remove \`structure\` or \`${key}\``,
  });
}

/** Every value of the file by its path. */
function placesOf(tree: TreeNode): Map<string, StudyPlace> {
  const places = new Map<string, StudyPlace>();
  const visit = (node: TreeNode): void => {
    if (node.place.path !== null) places.set(node.place.path, node.place);
    if (node.shape === "list") for (const item of node.items) visit(item);
    if (node.shape === "record") for (const entry of node.entries) visit(entry.value);
  };
  visit(tree);
  return places;
}
