import type { CifVersion } from "../cif/document.js";
import { cifItems, cifLoop, cifNumber, cifNumberList, cifQuoted, cifText } from "./cif-writing.js";
import type { CommensurateSymmetry, MagneticCif, MagneticCifAtom, ModulatedSymmetry } from "./types.js";

/** Decimals of a moment in μB. */
const momentDecimals = 6;

/**
 * A magnetic CIF in the vocabulary of the IUCr dictionaries (core 3.4.0, magnetic 0.9.9, modulated structures 3.2.5). CIF
 * 2.0 begins with its mark and has the wave vectors as lists; CIF 1.1 leaves list-valued items out.
 */
export function magneticCifText(content: MagneticCif, version: CifVersion): string {
  const { symmetry } = content;
  const lines = [
    ...(version === "2.0" ? ["#\\#CIF_2.0"] : ["#\\#CIF_1.1"]),
    ...content.remarks.map((line) => `# ${plainLine(line, version)}`),
    "",
    `data_${content.block}`,
    ...cifItems([
      ["_audit_conform.dict_name", "CIF_MAG"],
      ["_audit_conform.dict_version", cifQuoted("0.9.9")],
    ]),
    "",
    ...cellLines(content),
    "",
    ...parentLines(content, version),
    ...waveVectorLines(content, version),
    ...(symmetry.kind === "commensurate" ? commensurateLines(symmetry) : modulatedLines(symmetry)),
    ...atomLines(content.atoms),
    ...momentLines(content.atoms, symmetry.kind === "modulated"),
    ...(symmetry.kind === "modulated" ? waveLines(content.atoms, symmetry) : []),
  ];
  while (lines.at(-1) === "") lines.pop();
  return `${lines.join("\n")}\n`;
}

/** CIF 1.1 has ASCII alone. */
function plainText(text: string, version: CifVersion): string {
  if (version === "2.0") return text;
  return text
    .replaceAll("Γ", "Gamma")
    .replaceAll("−", "-")
    .replaceAll("–", "-")
    .replaceAll("Å", "A")
    .replace(/[^\n\x20-\x7e]/g, "?");
}

function plainLine(text: string, version: CifVersion): string {
  return plainText(text, version).replace(/\s+/g, " ");
}

function cellLines({ cell }: MagneticCif): string[] {
  return cifItems([
    ["_cell.length_a", cifNumber(cell.a, 5)],
    ["_cell.length_b", cifNumber(cell.b, 5)],
    ["_cell.length_c", cifNumber(cell.c, 5)],
    ["_cell.angle_alpha", cifNumber(cell.alpha, 5)],
    ["_cell.angle_beta", cifNumber(cell.beta, 5)],
    ["_cell.angle_gamma", cifNumber(cell.gamma, 5)],
  ]);
}

function parentLines({ parent }: MagneticCif, version: CifVersion): string[] {
  return [
    ...cifItems([
      ...(parent.symbol === null
        ? []
        : [["_parent_space_group.name_H-M_alt", cifText(parent.symbol, version)] as const]),
      ...(parent.number === null ? [] : [["_parent_space_group.IT_number", cifQuoted(String(parent.number))] as const]),
      ...(parent.toStandard === null
        ? []
        : [["_parent_space_group.transform_Pp_abc", cifQuoted(parent.toStandard)] as const]),
      ["_parent_space_group.child_transform_Pp_abc", cifQuoted(parent.toChild)],
    ]),
    "",
  ];
}

function waveVectorLines({ waveVectors }: MagneticCif, version: CifVersion): string[] {
  if (version === "1.1" || waveVectors.length === 0) return [];
  return cifLoop(
    ["_parent_propagation_vector.id", "_parent_propagation_vector.kxkykz"],
    waveVectors.map(({ id, components }) => [id, cifNumberList(components)]),
  );
}

function commensurateLines(symmetry: CommensurateSymmetry): string[] {
  return [
    ...cifItems([
      ["_space_group_magn.number_BNS", cifQuoted(symmetry.bns.number)],
      ["_space_group_magn.name_BNS", cifQuoted(symmetry.bns.symbol)],
      ["_space_group_magn.transform_BNS_Pp_abc", cifQuoted(symmetry.toBns)],
      ["_space_group_magn.point_group_name_H-M", cifQuoted(symmetry.pointGroup)],
    ]),
    "",
    ...operatorLoop("_space_group_symop_magn_operation", "xyz", symmetry.operators),
    ...operatorLoop("_space_group_symop_magn_centering", "xyz", symmetry.centrings),
  ];
}

function modulatedLines(symmetry: ModulatedSymmetry): string[] {
  const [x, y, z] = symmetry.waveVector.map((entry) => cifNumber(entry));
  return [
    ...cifItems([
      ["_cell.modulation_dimension", "1"],
      ...(symmetry.pointGroup === null
        ? []
        : [["_space_group_magn.point_group_name_H-M", cifQuoted(symmetry.pointGroup)] as const]),
    ]),
    "",
    ...cifLoop(
      ["_cell_wave_vector.seq_id", "_cell_wave_vector.x", "_cell_wave_vector.y", "_cell_wave_vector.z"],
      [["1", x as string, y as string, z as string]],
    ),
    ...operatorLoop("_space_group_symop_magn_ssg_operation", "algebraic", symmetry.operators),
    ...operatorLoop("_space_group_symop_magn_ssg_centering", "algebraic", symmetry.centrings),
  ];
}

function operatorLoop(category: string, item: string, operators: readonly string[]): string[] {
  return cifLoop(
    [`${category}.id`, `${category}.${item}`],
    operators.map((text, index) => [String(index + 1), text]),
  );
}

function atomLines(atoms: readonly MagneticCifAtom[]): string[] {
  const types = [...new Set(atoms.map(({ type }) => type))];
  return [
    ...cifLoop(
      ["_atom_type.symbol"],
      types.map((type) => [type]),
    ),
    ...cifLoop(
      [
        "_atom_site.label",
        "_atom_site.type_symbol",
        "_atom_site.fract_x",
        "_atom_site.fract_y",
        "_atom_site.fract_z",
        "_atom_site.occupancy",
      ],
      atoms.map(({ label, type, position, occupancy }) => [
        label,
        type,
        ...position.map((entry) => cifNumber(entry)),
        cifNumber(occupancy ?? 1),
      ]),
    ),
  ];
}

function momentLines(atoms: readonly MagneticCifAtom[], modulated: boolean): string[] {
  const magnetic = atoms.filter(({ moment }) => moment !== null);
  const formed = magnetic.every(({ moment }) => moment?.symmform !== null);
  return cifLoop(
    [
      "_atom_site_moment.label",
      "_atom_site_moment.crystalaxis_x",
      "_atom_site_moment.crystalaxis_y",
      "_atom_site_moment.crystalaxis_z",
      ...(formed ? ["_atom_site_moment.symmform"] : []),
      ...(modulated ? ["_atom_site_moment.modulation_flag"] : []),
    ],
    magnetic.map(({ label, moment }) => [
      label,
      ...(moment?.crystal ?? []).map((entry) => cifNumber(entry, momentDecimals)),
      ...(formed ? [moment?.symmform ?? ""] : []),
      ...(modulated ? [(moment?.waves.length ?? 0) > 0 ? "yes" : "no"] : []),
    ]),
  );
}

/** Two loops joined by an id, as the dictionary has two categories. */
function waveLines(atoms: readonly MagneticCifAtom[], { waveVector }: ModulatedSymmetry): string[] {
  const orders = [...new Set(atoms.flatMap(({ moment }) => moment?.waves.map(({ order }) => order) ?? []))].sort(
    (a, b) => a - b,
  );
  const rows = atoms.flatMap(({ label, moment }) =>
    (moment?.waves ?? []).flatMap((wave) =>
      ["x", "y", "z"].map((axis, component) => ({ label, axis, component, wave })),
    ),
  );
  const formed = rows.every(({ wave }) => wave.cosineForms !== null && wave.sineForms !== null);
  return [
    ...cifLoop(
      [
        "_atom_site_Fourier_wave_vector.seq_id",
        "_atom_site_Fourier_wave_vector.q1_coeff",
        "_atom_site_Fourier_wave_vector.x",
        "_atom_site_Fourier_wave_vector.y",
        "_atom_site_Fourier_wave_vector.z",
      ],
      orders.map((order, index) => [
        String(index + 1),
        String(order),
        ...waveVector.map((entry) => cifNumber(order * entry)),
      ]),
    ),
    ...cifLoop(
      [
        "_atom_site_moment_Fourier.id",
        "_atom_site_moment_Fourier.atom_site_label",
        "_atom_site_moment_Fourier.wave_vector_seq_id",
        "_atom_site_moment_Fourier.axis",
      ],
      rows.map(({ label, axis, wave }, index) => [
        String(index + 1),
        label,
        String(orders.indexOf(wave.order) + 1),
        axis,
      ]),
    ),
    ...cifLoop(
      [
        "_atom_site_moment_Fourier_param.id",
        "_atom_site_moment_Fourier_param.cos",
        "_atom_site_moment_Fourier_param.sin",
        ...(formed
          ? ["_atom_site_moment_Fourier_param.cos_symmform", "_atom_site_moment_Fourier_param.sin_symmform"]
          : []),
      ],
      rows.map(({ component, wave }, index) => [
        String(index + 1),
        cifNumber(wave.cosine[component] ?? 0, momentDecimals),
        cifNumber(wave.sine[component] ?? 0, momentDecimals),
        ...(formed ? [wave.cosineForms?.[component] ?? "0", wave.sineForms?.[component] ?? "0"] : []),
      ]),
    ),
  ];
}
