import { decimals, plain } from "../../text/names.js";
import { extinctionText, extinctText, hasExtinctions, lineText, overlapsText } from "../../text/satellites-text.js";
import { type DocumentSection, moreBlock, paragraphBlock, tableBlock } from "../blocks.js";
import type { BranchSource } from "../run-document.js";

const shownLines = 12;
/** Lines that are listed at all; the CSV has every one. */
const listedLines = 500;

/** Where the satellites of this k are, and what else lies there. */
export function satellitesSection({ branch: { satellites }, prefix }: BranchSource): DocumentSection | null {
  if (satellites === null) return null;
  const angles = satellites.wavelengthAngstrom !== null;
  const zeros = hasExtinctions(satellites);
  const columns = [
    "line",
    ">Q / Å⁻¹",
    ">d / Å",
    ...(angles ? [">2θ / °"] : []),
    ">n",
    ">n(star)",
    ...(zeros ? ["zero for"] : []),
    "also on it",
  ];
  const rows = satellites.reflections.map((line) => [
    lineText(line),
    decimals(line.q, 5),
    decimals(line.d, 4),
    ...(angles ? [decimals(line.twoThetaDeg, 3)] : []),
    String(line.multiplicity),
    String(line.multiplicityAllArms),
    ...(zeros ? [extinctText(line)] : []),
    overlapsText(line),
  ]);
  const caption = `Satellites up to Q = ${plain(Number(satellites.qMax.toFixed(3)))} Å⁻¹`;
  return {
    id: `${prefix}-satellites`,
    title: "Satellites",
    parts: [],
    blocks: [
      ...tableBlock(
        `${caption}: the first ${Math.min(shownLines, rows.length)} of ${rows.length}`,
        columns,
        rows.slice(0, shownLines),
      ),
      ...(rows.length > shownLines
        ? moreBlock(`${rows.length - shownLines} more lines`, [
            ...tableBlock(caption, columns, rows.slice(shownLines, listedLines)),
            ...(rows.length > listedLines ? [paragraphBlock("The CSV table has all of them.")] : []),
          ])
        : []),
      paragraphBlock(
        `n: vectors of one single-k domain, n(star): over all arms. Also on it: nuclear lines within ${plain(satellites.overlapWithin)} Å⁻¹ and images of nuclear lines through half the wavelength.${extinctionText(satellites)}`,
      ),
    ],
  };
}
