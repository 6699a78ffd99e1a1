import { exchangeSummary } from "../../text/exchange-text.js";
import { plain } from "../../text/names.js";
import { type DocumentSection, fieldsBlock, moreBlock, paragraphBlock, tableBlock } from "../blocks.js";
import type { DocumentSource } from "../run-document.js";

/** Which k the exchange constants of the study prefer, and how far above the k of the branches lie. */
export function exchangeSection({ record: { exchange } }: DocumentSource): DocumentSection | null {
  if (exchange === null) return null;
  return {
    id: "exchange",
    title: "Exchange model",
    parts: [],
    blocks: [
      ...fieldsBlock(exchangeSummary(exchange)),
      ...moreBlock(
        "Energies of arrangements",
        tableBlock(
          "Energies of the arrangements that these k allow, a spin, lowest first",
          ["id", "irreps", ">lowest", ">highest"],
          exchange.configurations.map(({ id, irreps, lowest, highest }) => [
            id,
            irreps.join("+"),
            plain(Number(lowest.toPrecision(8))),
            plain(Number(highest.toPrecision(8))),
          ]),
        ),
      ),
      paragraphBlock(
        "Classical spins at zero temperature with isotropic exchange: anisotropy, dipolar and antisymmetric exchange and fluctuations are not in it.",
      ),
    ],
  };
}
