import type { IrrepModesRecord, ModesRecord, SiteModesRecord } from "../../records/modes.js";
import { waveText } from "../../text/convention-text.js";
import {
  decompositionText,
  inComponents,
  parameterText,
  relationFields,
  sizeFields,
  suborbitText,
} from "../../text/modes-text.js";
import { positionText } from "../../text/names.js";
import { type Block, type DocumentSection, fieldsBlock, moreBlock, paragraphBlock, tableBlock } from "../blocks.js";
import type { BranchSource } from "../run-document.js";

/** For each site the decomposition, and for each irrep what it allows and its basis vectors. */
export function modesSection({ branch: { modes }, prefix }: BranchSource): DocumentSection | null {
  if (modes.sites.length === 0) return null;
  const half = modes.minusK === "equivalent";
  return {
    id: `${prefix}-modes`,
    title: "Modes",
    blocks: [
      ...tableBlock(
        "Decomposition of the magnetic representation",
        ["site", "decomposition", ">atoms in the primitive cell"],
        modes.sites.map((site) => [site.label, decompositionText(site), String(site.orbit.length)]),
      ),
      paragraphBlock(
        half
          ? "In the tables letters are free real amplitudes, along a, b, c."
          : "In the tables letters are free complex amplitudes, along a, b, c; kx, ky, kz are the components of k.",
      ),
    ],
    parts: modes.sites.map((site, index) => siteSection(inComponents(site, modes.k), index, modes, prefix)),
  };
}

function siteSection(site: SiteModesRecord, index: number, modes: ModesRecord, prefix: string): DocumentSection {
  const carried = site.irreps.filter(({ multiplicity }) => multiplicity > 0);
  return {
    id: `${prefix}-site-${index + 1}`,
    title: `Site ${site.label}`,
    parts: [],
    blocks: [
      ...tableBlock(
        `Allowed S of ${site.label}, atom by atom`,
        ["irrep", ">free", ...site.orbit.map((position, atom) => `${atom + 1}: ${positionText(position)}`)],
        carried.map((irrep) => [
          irrep.label,
          String(irrep.freeParameters),
          ...site.orbit.map((_, atom) => irrep.constraint[atom] ?? "(0, 0, 0)"),
        ]),
      ),
      ...(site.suborbits.length > 1 ? [paragraphBlock(`Orbits under the little group: ${suborbitText(site)}.`)] : []),
      ...carried.flatMap((irrep) =>
        moreBlock(`${irrep.label} on ${site.label}: parameters and basis vectors`, irrepBlocks(site, irrep, modes)),
      ),
    ],
  };
}

function irrepBlocks(site: SiteModesRecord, irrep: IrrepModesRecord, modes: ModesRecord): Block[] {
  const one = irrep.minusK?.constraint ?? null;
  return [
    ...fieldsBlock([
      ["Dimension", `${irrep.dimension}, ${irrep.reality}`],
      ["Free real parameters", parameterText(irrep)],
      ...relationFields(site, irrep),
      ...sizeFields(irrep, modes),
      ...(irrep.vanishingAtoms.length > 0
        ? [["Atoms without a moment", irrep.vanishingAtoms.map((atom) => atom + 1).join(", ")] as const]
        : []),
    ]),
    ...(one === null || one.join() === irrep.constraint.join()
      ? []
      : tableBlock(
          "The arrangement of one order parameter",
          [">atom", "S along a, b, c"],
          one.map((text, atom) => [String(atom + 1), text]),
        )),
    ...tableBlock(
      `Basis vectors, exact, along a, b, c; with ${waveText(modes.convention)}`,
      [">copy", ">partner", ...site.orbit.map((_, atom) => `atom ${atom + 1}`)],
      irrep.modes.map((mode) => [
        String(mode.copy),
        String(mode.partner),
        ...site.orbit.map((_, atom) => `(${(mode.exact[atom] ?? []).join(", ")})`),
      ]),
    ),
  ];
}
