import type { Envelope } from "../records/common.js";
import type { BranchRecord, RunRecord } from "../records/run.js";
import { kShort } from "../text/names.js";
import type { DocumentSection, ReportDocument } from "./blocks.js";
import { askedSection } from "./sections/asked.js";
import { branchSymmetry } from "./sections/branch-symmetry.js";
import { cautionsSection } from "./sections/cautions.js";
import { configurationsSection } from "./sections/configurations.js";
import { exchangeSection } from "./sections/exchange.js";
import { irrepsSection } from "./sections/irreps.js";
import { modesSection } from "./sections/modes.js";
import { momentsSection } from "./sections/moments.js";
import { nextSection } from "./sections/next.js";
import { onsetSection } from "./sections/onset.js";
import { peaksSection } from "./sections/peaks.js";
import { repeatSection } from "./sections/repeat.js";
import { satellitesSection } from "./sections/satellites.js";
import { summaryBlocks } from "./sections/summary.js";
import { waveVectorSection } from "./sections/wave-vector.js";
import { weightsSection } from "./sections/weights.js";
import { zoneSection } from "./sections/zone.js";

/** What a section is made from. */
export interface DocumentSource {
  readonly answer: Envelope<RunRecord>;
  readonly record: RunRecord;
  /** The file that the report is asked for; null where it is printed or is one of a result folder. */
  readonly file: string | null;
  /** Where a section puts the data of its live views. */
  readonly data: { [key: string]: unknown };
}

/** One branch of the job, by index, with the letters that its names begin with. */
export interface BranchSource extends DocumentSource {
  readonly branch: BranchRecord;
  readonly index: number;
  readonly prefix: string;
}

/** Null where the record has nothing for the section. */
type SectionOf<Source> = (source: Source) => DocumentSection | null;

/** The parts that follow from one k, in the order of the job. */
const branchParts: readonly SectionOf<BranchSource>[] = [
  branchSymmetry,
  irrepsSection,
  modesSection,
  momentsSection,
  configurationsSection,
  satellitesSection,
  weightsSection,
];

/** The whole report, in the order in which a user asks. */
const parts: readonly SectionOf<DocumentSource>[] = [askedSection, waveVectorSection, peaksSection, zoneSection];
const closing: readonly SectionOf<DocumentSource>[] = [
  exchangeSection,
  onsetSection,
  nextSection,
  cautionsSection,
  repeatSection,
];

/**
 * The report of the whole job as a document, made from the answer and the name of its file alone: the same ones give the
 * same document.
 */
export function runDocument(answer: Envelope<RunRecord>, file: string | null = null): ReportDocument {
  const record = answer.result;
  if (record === null) throw new TypeError("a report needs a result");
  const source: DocumentSource = { answer, record, file, data: {} };
  const built = (makers: readonly SectionOf<DocumentSource>[]) =>
    makers.map((maker) => maker(source)).filter((section) => section !== null);
  const sections = [
    ...built(parts),
    ...record.branches.map((_, index) => branchSection(source, index)),
    ...built(closing),
  ];
  return {
    title: record.title ?? "Study",
    summary: summaryBlocks(source),
    sections,
    data: source.data,
    version: answer.kvane,
  };
}

function branchSection(source: DocumentSource, index: number): DocumentSection {
  const branch = source.record.branches[index] as BranchRecord;
  const several = source.record.branches.length > 1;
  const prefix = `branch-${index + 1}`;
  return {
    id: prefix,
    title: `${several ? `Branch ${index + 1}: what` : "What"} follows from k = ${kShort(branch.k)}`,
    blocks: [],
    parts: branchParts
      .map((maker) => maker({ ...source, branch, index, prefix }))
      .filter((section) => section !== null),
  };
}
