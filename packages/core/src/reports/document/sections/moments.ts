import { exampleDirection, momentScene } from "../../svg/moment-data.js";
import { momentProjections, siteLegend } from "../../svg/moment-drawing.js";
import { momentsOf } from "../../svg/moments.js";
import { type Block, type DocumentSection, paragraphBlock } from "../blocks.js";
import { momentFigureNames } from "../figure-names.js";
import type { BranchSource } from "../run-document.js";

/** One example of each irrep as moments in the cell: projections, and in a page a view that can be turned. */
export function momentsSection({ record, branch, index, prefix, data }: BranchSource): DocumentSection | null {
  const files = momentFigureNames(record, index);
  const scene = files.length > 0 ? momentScene(record, branch) : null;
  if (scene === null) return null;
  const key = `${prefix}-moments`;
  data[key] = scene;
  const legend = siteLegend(scene);
  const largest = Math.max(
    ...branch.modes.sites.flatMap(({ irreps }) =>
      irreps.map(({ dimension, multiplicity }) => (multiplicity > 0 ? dimension : 1)),
    ),
  );
  const examples = scene.arrangements.flatMap(({ example, name }, arrangement) =>
    example ? [{ arrangement, name }] : [],
  );
  return {
    id: `${prefix}-drawings`,
    title: "Moments in the cell",
    parts: [],
    blocks: [
      paragraphBlock(
        `Examples, not results: for each irrep the first copy on every site${largest > 1 ? `, its partners with amplitudes of the sizes ${exampleDirection(largest)}` : ""}, and further copies only where atoms would be left without a moment; ${scene.cells.join(" × ")} cells${branch.star.arms.length > 1 ? ", of this arm of the star alone" : ""}. The sizes are arbitrary, and so is their proportion between sites and copies.`,
      ),
      { kind: "live", id: `${key}-view`, label: "Moments that can be turned", view: { kind: "moments", data: key } },
      ...examples.map(({ arrangement, name }, set): Block => {
        const { phase } = momentsOf(scene, arrangement);
        const [title = name] = name.split(":");
        const advanced =
          phase === 0
            ? ""
            : `, all advanced by ${phase === 0.125 ? "1/8" : "1/4"} turn so that no atom is left out by chance`;
        return {
          kind: "figure",
          figure: {
            id: `${key}-${set + 1}`,
            caption: `${title}: seen from the ends of a, b and c. Arrows begin at their atoms${advanced}; ⊙ points to the eye, ⊗ away from it; what is far is paler.`,
            parts: momentProjections(scene, arrangement),
            legend,
            file: files[set] ?? "",
            live: null,
          },
        };
      }),
    ],
  };
}
