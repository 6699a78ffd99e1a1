import { cautionText, conventionSentences } from "../../text/closing-text.js";
import { type Block, type DocumentSection, paragraphBlock, tableBlock } from "../blocks.js";
import type { DocumentSource } from "../run-document.js";

const safety =
  "Beams, activated samples, radioactive sources, magnets and cryogenics are handled by the local rules and by trained staff; nothing in this report takes their place.";

/** Warnings of this run, what was assumed, and what such results cannot say. */
export function cautionsSection({ answer }: DocumentSource): DocumentSection {
  const caution = cautionText(answer.command);
  return {
    id: "cautions",
    title: "Warnings and cautions",
    parts: [],
    blocks: [
      ...answer.warnings.map(
        ({ message, remedy, code }): Block => ({
          kind: "note",
          tone: "warning",
          text: `${message}${remedy === null ? "" : `: ${remedy}`} [${code}]`,
        }),
      ),
      ...tableBlock(
        "Assumed",
        ["what", "taken as", "because"],
        answer.assumed.map(({ what, value, because }) => [what, value, because]),
      ),
      ...(caution === null ? [] : [paragraphBlock(caution)]),
      ...conventionSentences(answer).map(paragraphBlock),
      paragraphBlock(safety),
    ],
  };
}
