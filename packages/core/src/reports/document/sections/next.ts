import { kShort } from "../../text/names.js";
import { separationSentences } from "../../text/search-text.js";
import { type Block, type DocumentSection, listBlock, paragraphBlock } from "../blocks.js";
import type { DocumentSource } from "../run-document.js";

/** What is tied, and what to measure next. */
export function nextSection({ record }: DocumentSource): DocumentSection {
  return {
    id: "next",
    title: "What is tied, and what to do next",
    parts: [],
    blocks: [
      ...tieBlocks(record),
      ...listBlock(record.next, { ordered: true }),
      ...(record.next.length === 0 ? [paragraphBlock("Nothing follows from these data alone.")] : []),
    ],
  };
}

function tieBlocks({ search, branches, notFollowed }: DocumentSource["record"]): Block[] {
  if (search === null) return [];
  const ties = search.candidates.flatMap((candidate, index) => {
    const later = candidate.tiedWith.filter((other) => other > index);
    if (later.length === 0 || !branches.some((branch) => branch.candidate === index)) return [];
    const names = later.map((other) => {
      const one = search.candidates[other];
      return one === undefined ? String(other + 1) : `${other + 1} (k = ${kShort(one.k)})`;
    });
    return [
      `Candidate ${index + 1}, k = ${kShort(candidate.k)}, is tied with ${names.join(", ")}: these positions cannot tell them apart.`,
    ];
  });
  const left = notFollowed.map((index) => index + 1);
  return [
    ...(ties.length === 0 ? [paragraphBlock("No candidate is tied with one that was followed.")] : listBlock(ties)),
    ...(left.length > 0 ? [paragraphBlock(`Tied but not followed here: candidate ${left.join(", ")}.`)] : []),
    ...listBlock(separationSentences(search)),
  ];
}
