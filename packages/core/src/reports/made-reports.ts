import type { Block, DocumentFigure, DocumentSection, ReportDocument } from "./document/blocks.js";
import { runDocument } from "./document/run-document.js";
import { htmlPage } from "./html/page.js";
import { markdownText } from "./markdown/markdown.js";
import type { Envelope } from "./records/common.js";
import type { RunRecord } from "./records/run.js";
import { besideEachOther, standaloneSvg } from "./svg/figure.js";

/** The whole job as one page. */
export function htmlReport(answer: Envelope<RunRecord>, file: string | null = null): string {
  return htmlPage(runDocument(answer, file));
}

/** The whole job as Markdown. */
export function markdownReport(
  answer: Envelope<RunRecord>,
  figures: "beside" | "none",
  file: string | null = null,
): string {
  return markdownText(runDocument(answer, file), { figures });
}

/** Everything of a result folder that is made from the document: the page, the Markdown and the drawings, by name. */
export function documentFiles(answer: Envelope<RunRecord>): ReadonlyMap<string, string> {
  const document = runDocument(answer);
  return new Map([
    ["report.html", htmlPage(document)],
    ["report.md", markdownText(document, { figures: "beside" })],
    ...figuresOf(document).map((figure): [string, string] => [figure.file, figureFile(figure)]),
  ]);
}

/** Parts that a page sets below each other on a phone stand side by side in the file, the legend in front. */
function figureFile({ parts, legend, caption }: DocumentFigure): string {
  const [first] = parts;
  if (first === undefined) throw new TypeError("a figure without a drawing");
  if (parts.length === 1) return standaloneSvg(first);
  const all = legend === null ? parts : [...parts, legend];
  return standaloneSvg(besideEachOther(all, caption, parts.map(({ description }) => description).join(" ")));
}

function figuresOf({ sections }: ReportDocument): DocumentFigure[] {
  const inBlocks = (blocks: readonly Block[]): DocumentFigure[] =>
    blocks.flatMap((block) =>
      block.kind === "figure" ? [block.figure] : block.kind === "more" ? inBlocks(block.blocks) : [],
    );
  const inSection = ({ blocks, parts }: DocumentSection): DocumentFigure[] => [
    ...inBlocks(blocks),
    ...parts.flatMap(inSection),
  ];
  return sections.flatMap(inSection);
}
