import {
  draftStudyOf,
  magneticSitesOf,
  parseCif,
  parseFourierComponents,
  parseIntensityList,
  parseMomentList,
  parsePeakList,
  parseScanTable,
  parseStudy,
  readCifStructure,
  readMagneticCif,
  structureBlocksOf,
} from "@kvane/core/files";
import type { Random } from "../../support/random.js";
import { demandPlain, demandProblems, demandWithin, readOrRefused } from "../properties.js";
import { target } from "../target.js";
import { corpus, type FileKind } from "../texts/corpus.js";
import { damaged } from "../texts/damage.js";
import { heavyText } from "../texts/heavy.js";
import { randomText, wordsOf } from "../texts/random-text.js";

/** A text of a kind of file, and a number that chooses among the reader's options. */
interface FileInput {
  readonly text: string;
  readonly way: number;
}

const file = "broken";
const dictionaries = new Map<FileKind, readonly string[]>();

/** A spoilt text mostly, now and then one that was never good, or one that is heavy. */
export function fileText(kind: FileKind, random: Random): string {
  const choice = random.below(20);
  if (choice === 0) return heavyText(kind, random);
  if (choice < 4) {
    const words = dictionaries.get(kind) ?? wordsOf(corpus[kind]);
    dictionaries.set(kind, words);
    return randomText(random, words);
  }
  const others = choice < 6 ? Object.values(corpus).flat() : corpus[kind];
  return damaged(random.pick(corpus[kind]), random, others);
}

/** What a reader refuses is refused with a place in the text; what it takes is plain data. */
function fileTarget(kind: FileKind, share: number, few: number, read: (input: FileInput) => unknown) {
  return target<FileInput>({
    name: kind,
    share,
    few,
    patience: 5,
    make: (random) => ({ text: fileText(kind, random), way: random.below(8) }),
    run: (input) =>
      readOrRefused(
        async () => demandPlain(await read(input)),
        (problems) => demandWithin(problems, input.text, file),
      ),
  });
}

const kinds = [undefined, "d", "q", "two-theta", "hkl"] as const;

function listOptions(way: number) {
  const kind = kinds[way % kinds.length];
  return { file, ...(kind ? { kind } : {}), ...(way > 2 ? { wavelengthAngstrom: 2.41 } : {}) };
}

/** All that is read of a CIF: grammar, structure, sites that may carry moments, a draft of a study. */
async function readCif({ text, way }: FileInput): Promise<unknown> {
  const document = await parseCif(text, file, { strict: way === 0 });
  if (document.warnings.length > 0) demandProblems(document.warnings);
  demandWithin(document.warnings, text, file);
  for (const block of way < 4 ? [null] : await structureBlocksOf(document)) {
    const structure = await readCifStructure(document, block);
    const problems = Object.values(structure.problems).flat();
    if (problems.length > 0) demandProblems(problems);
    demandWithin(problems, text, file);
    const { group } = structure.symmetry ?? { group: null };
    const { sites: _sites, ...rest } = structure;
    demandPlain(rest);
    // What a structure lacks as a whole stands nowhere in it; the command that asks knows where the file was named.
    const sites = () => magneticSitesOf(structure, group, structure.cell?.cell ?? null);
    await readOrRefused(
      async () => demandPlain(await sites()),
      () => {},
    );
    if (group !== null) await parseStudy((await draftStudyOf(structure, group, null, [])).text, file);
  }
  return document;
}

export const fileTargets = [
  fileTarget("cif", 9_000, 150, readCif),
  fileTarget("magnetic-cif", 6_000, 100, async ({ text }) => readMagneticCif(await parseCif(text, file))),
  fileTarget("study", 6_000, 100, ({ text }) => parseStudy(text, file)),
  fileTarget("peaks", 11_000, 200, ({ text, way }) => parsePeakList(text, listOptions(way))),
  fileTarget("intensities", 8_000, 150, ({ text, way }) => parseIntensityList(text, listOptions(way))),
  fileTarget("scan", 8_000, 150, ({ text }) => parseScanTable(text, file)),
  fileTarget("moments", 8_000, 100, ({ text }) => parseMomentList(text, file)),
  fileTarget("components", 7_000, 100, ({ text, way }) => parseFourierComponents(text, { file, atoms: 1 + way })),
];
