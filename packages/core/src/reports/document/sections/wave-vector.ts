import type { CandidateRecord, SearchRecord } from "../../records/search.js";
import { counted, decimals, dimensionText, kShort } from "../../text/names.js";
import {
  certificateSentences,
  correctionSentences,
  mergedSentences,
  misfitOf,
  nearText,
  referenceSentences,
  tiesText,
} from "../../text/search-text.js";
import {
  type Block,
  type DocumentSection,
  fieldsBlock,
  listBlock,
  moreBlock,
  paragraphBlock,
  tableBlock,
} from "../blocks.js";
import type { DocumentSource } from "../run-document.js";

/** Candidates that are seen at once. */
const shownCandidates = 8;
/** Candidates that are listed at all; the JSON has every one. */
const listedCandidates = 60;

/** The candidates for k with their evidence, and how far the search is complete. */
export function waveVectorSection({ record }: DocumentSource): DocumentSection | null {
  const { search } = record;
  if (search === null) return null;
  const { candidates } = search;
  const followed = new Set(record.branches.map(({ candidate }) => candidate));
  const rows = candidates.map((candidate, index) => candidateRow(candidate, index, followed.has(index)));
  const certificate = certificateSentences(search);
  return {
    id: "wave-vector",
    title: certificate === null ? "The given k against the peaks" : "Candidates for k",
    parts: [],
    blocks: [
      ...(certificate === null ? [] : [paragraphBlock(certificate)]),
      ...(rows.length === 0 ? [paragraphBlock("There is no candidate.")] : []),
      ...tableBlock("Candidates, by evidence", candidateColumns, rows.slice(0, shownCandidates)),
      ...moreBlock(`${rows.length - shownCandidates} more candidates`, [
        ...tableBlock("Further candidates", candidateColumns, rows.slice(shownCandidates, listedCandidates)),
        ...(rows.length > listedCandidates
          ? [paragraphBlock(`${counted(rows.length - listedCandidates, "further candidate")} in result.json.`)]
          : []),
      ]).filter(() => rows.length > shownCandidates),
      paragraphBlock(
        "Evidence is the natural logarithm of the odds against chance, less what is charged for having searched; misfit is the root mean square of (observed − computed) in standard uncertainties.",
      ),
      ...listBlock([...correctionSentences(search), ...referenceSentences(search)]),
      ...severalVectors(search),
      ...moreBlock("The same find in higher kinds", listBlock(mergedSentences(search))),
      ...moreBlock("Details of the followed candidates", followedDetails(search, followed)),
      ...moreBlock("What was searched, kind by kind", kindsTable(search)),
    ],
  };
}

const candidateColumns = [">", "k", "kind", ">arms", ">matched", ">misfit / s.u.", ">evidence", "reading", "tied with"];

function candidateRow(candidate: CandidateRecord, index: number, followed: boolean): string[] {
  return [
    `${index + 1}${followed ? "\u00a0→" : ""}`,
    kShort(candidate.k),
    candidate.dimension === 3 ? "general" : dimensionText(candidate.dimension),
    String(candidate.arms),
    `${candidate.matched} of ${candidate.total}`,
    decimals(misfitOf(candidate), 2),
    decimals(candidate.evidence.value, 1),
    candidate.evidence.reading,
    tiesText(candidate.tiedWith),
  ];
}

function followedDetails({ candidates }: SearchRecord, followed: ReadonlySet<number | null>): Block[] {
  return candidates.flatMap((candidate, index) => {
    if (!followed.has(index)) return [];
    const { evidence, residuals } = candidate;
    return fieldsBlock([
      ["Candidate", `${index + 1}, k = ${kShort(candidate.k)}`],
      [
        "Evidence",
        `${decimals(evidence.value, 1)}; charged: ${decimals(evidence.charges.dimensions, 1)} for dimensions, ${decimals(evidence.charges.kinds, 1)} for kinds, ${decimals(evidence.charges.tuning, 1)} for tuning`,
      ],
      [
        "Residuals",
        `χ² ${decimals(residuals.chiSquared, 2)} with ${counted(residuals.degreesOfFreedom, "degree")} of freedom; largest ${decimals(residuals.largest, 5)}`,
      ],
      [
        "Figures of merit",
        `de Wolff ${decimals(candidate.deWolff, 1)}, Smith & Snyder ${decimals(candidate.smithSnyder, 1)}`,
      ],
      ...(candidate.nearFractions.length > 0
        ? [["Near fractions", candidate.nearFractions.map(nearText).join(", ")] as const]
        : []),
    ]);
  });
}

/** Harmonics, sums and second vectors that explain more peaks than one vector alone. */
function severalVectors({ severalVectors: several }: SearchRecord): Block[] {
  return tableBlock(
    "More than one vector",
    ["vectors", ">matched", ">evidence", ">gain", "reading"],
    (several?.found ?? []).map((find) => [
      find.members.map(({ name, k, peaks }) => `${name} = ${kShort(k)}, ${counted(peaks.length, "peak")}`).join("; "),
      `${find.matched} of ${find.total}`,
      decimals(find.evidence.value, 1),
      decimals(find.gain, 1),
      find.evidence.reading,
    ]),
  );
}

function kindsTable({ certificate }: SearchRecord): Block[] {
  if (certificate === null) return [];
  return tableBlock(
    "Kinds of k that were searched",
    ["kind", "of dimension", ">boxes", ">regions left", ">undecided", "all weighed"],
    certificate.kinds.map((kind) => [
      kShort(kind.kind),
      dimensionText(kind.dimension),
      String(kind.boxes),
      String(kind.regions),
      String(kind.undecided),
      kind.allWeighed ? "yes" : "no",
    ]),
  );
}
