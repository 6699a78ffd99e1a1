import { phaseDiagramChart } from "../../svg/phase-diagram.js";
import { phaseLetter } from "../../text/exchange-diagram-text.js";
import { exchangeSummary } from "../../text/exchange-text.js";
import { plain } from "../../text/names.js";
import { type Block, type DocumentSection, fieldsBlock, moreBlock, paragraphBlock, tableBlock } from "../blocks.js";
import { diagramFigureName } from "../figure-names.js";
import type { DocumentSource } from "../run-document.js";

/** Which k the exchange constants of the study prefer, and how far above the k of the branches lie. */
export function exchangeSection({ record }: DocumentSource): DocumentSection | null {
  const { exchange } = record;
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
      ...diagramBlocks(record),
      paragraphBlock(
        "Classical spins at zero temperature with isotropic exchange: anisotropy, dipolar and antisymmetric exchange and fluctuations are not in it.",
      ),
    ],
  };
}

/** Where which k is preferred while a constant or two run, with the boundaries where there is one. */
function diagramBlocks(record: DocumentSource["record"]): Block[] {
  const diagram = record.exchange?.diagram ?? null;
  const file = diagramFigureName(record);
  if (diagram === null || file === null) return [];
  return [
    {
      kind: "figure",
      figure: {
        id: "figure-phase-diagram",
        caption: `The k of least energy while ${diagram.axes.map(({ name }) => `J${name}`).join(" and ")} ${diagram.axes.length === 1 ? "runs" : "run"}, all other constants as given.`,
        parts: [phaseDiagramChart(diagram)],
        legend: null,
        file,
        live: null,
      },
    },
    ...tableBlock(
      "Boundaries of the phases",
      [`>J${diagram.axes[0]?.name ?? ""}`, "from", "to", "k"],
      (diagram.boundaries ?? []).map(({ value, from, to, sudden }) => [
        String(Number(value.toPrecision(7))),
        phaseLetter(from),
        phaseLetter(to),
        sudden ? "jumps" : "moves away gradually",
      ]),
    ),
  ];
}
