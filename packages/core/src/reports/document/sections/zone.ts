import { zoneData } from "../../svg/zone-data.js";
import { zoneDrawing } from "../../svg/zone-drawing.js";
import { type DocumentSection, listBlock, paragraphBlock, tableBlock } from "../blocks.js";
import { zoneFigureName } from "../figure-names.js";
import type { DocumentSource } from "../run-document.js";

/** The first zone with its special points and lines, and where the candidates lie. */
export function zoneSection({ record, data }: DocumentSource): DocumentSection | null {
  const zone = zoneData(record);
  const file = zoneFigureName(record);
  if (zone === null || file === null) return null;
  data["zone"] = zone;
  return {
    id: "zone",
    title: "Where k lies in the first zone",
    parts: [],
    blocks: [
      {
        kind: "figure",
        figure: {
          id: "figure-zone",
          caption: `The first Brillouin zone of the lattice, c* upright as far as the cell lets it. Black dots are special points, thin lines special lines of the point group with −1, one of each kind; diamonds are the arms (and their negatives) of the k that are followed${zone.marks.some(({ followed }) => !followed) ? ", rings those of other candidates" : ""}.`,
          parts: [zoneDrawing(zone)],
          legend: null,
          file,
          live: { kind: "zone", data: "zone" },
        },
      },
      ...tableBlock(
        "Candidates in the drawing",
        ["mark", "k", ">places, with −k"],
        zone.marks.map(({ name, k, followed, places }) => [
          `${name}${followed ? " (followed)" : ""}`,
          k,
          String(places.length),
        ]),
      ),
      paragraphBlock("Numbers in the drawing, points first, then lines:"),
      ...listBlock(
        [...zone.points, ...zone.lines].map(({ number, k }) => `${number}: ${k}`),
        { short: true },
      ),
    ],
  };
}
