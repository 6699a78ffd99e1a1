import { fail, KvaneError, type Place, type Problem, problem, whyNoNumber } from "../../errors/index.js";
import { type MagneticOperator, parseMagneticTriplet } from "../../magneticgroups/index.js";
import { type BasisChange, type Cell, parseBasisChange } from "../../spacegroups/index.js";
import { type BlockReader, firstText, locate, openBlock, rowsOf, valuesOf } from "../cif/block-reader.js";
import { readCell } from "../cif/cell.js";
import { chooseBlock } from "../cif/choose-block.js";
import type { CifDocument, CifText, CifValue } from "../cif/document.js";
import { ionOfSymbol } from "../cif/ions.js";
import { numberOf } from "../cif/numbers.js";
import { blockPlace, placeIn, readingValue } from "../cif/places.js";
import { saidText } from "../cif/values.js";
import { momentIn } from "./moment-components.js";
import type { MomentWave } from "./types.js";

/** A magnetic structure as a magnetic CIF gives it, in the axes of the file. */
export interface MagneticStructure {
  readonly file: string;
  readonly block: string;
  readonly cell: Cell;
  /** From the parent as used to the axes of the file; null where the file does not say it. */
  readonly childFromParent: BasisChange | null;
  /** Of a commensurate structure; both empty for a modulated one. Their products make the group modulo integers. */
  readonly operators: readonly MagneticOperator[];
  readonly centrings: readonly MagneticOperator[];
  /** Of a modulated structure: one wave vector in the reciprocal lattice of the file's cell, and superspace operators. */
  readonly modulation: {
    readonly waveVector: readonly [number, number, number];
    readonly operators: readonly string[];
    readonly centrings: readonly string[];
  } | null;
  readonly named: { readonly bns: string | null };
  readonly atoms: readonly MagneticAtom[];
}

/** An atom that the file gives a moment. */
export interface MagneticAtom {
  readonly label: string;
  readonly ion: string | null;
  readonly position: readonly [number, number, number];
  /** μB along unit vectors of the file's axes: the moment, or the mean moment. */
  readonly crystal: readonly [number, number, number];
  readonly waves: readonly Pick<MomentWave, "order" | "cosine" | "sine">[];
  readonly place: Partial<Place>;
}

/**
 * Reads the magnetic structure of one block: cell, magnetic symmetry, atoms with moments. Both spellings of the data names
 * are known; moments may be along the crystal axes, Cartesian or spherical, as the magnetic dictionary has them.
 *
 * @throws `cif-missing`, `cif-value`, `cif-block`, `syntax`, `invalid-cell`, with places
 */
export function readMagneticStructure(document: CifDocument, block: string | null): MagneticStructure {
  const chosen = chooseBlock(document, block);
  const reader = openBlock(document, chosen.block);
  const { cell } = readCell(reader);
  const modulation = modulationOf(reader);
  const operators = modulation === null ? operatorsOf(reader, operationNames, "operation") : [];
  return {
    file: document.file,
    block: chosen.block.code,
    cell,
    childFromParent: childOf(reader),
    operators,
    centrings: modulation === null ? centringsOf(reader) : [],
    modulation,
    named: { bns: firstText(reader, "_space_group_magn_number_BNS")?.text ?? null },
    atoms: atomsOf(reader, cell),
  };
}

const operationNames = ["_space_group_symop_magn_operation_xyz", "_space_group_symop_magn_xyz"];
const centringNames = ["_space_group_symop_magn_centering_xyz"];

function operatorsOf(reader: BlockReader, names: readonly string[], what: string): readonly MagneticOperator[] {
  const texts = textsOf(reader, names);
  if (texts.length === 0)
    return fail("cif-missing", `the data block ${reader.block.code} has no magnetic ${what}s`, {
      where: blockPlace(reader),
      expected: `${names[0]}, or _space_group_symop_magn_ssg_operation_algebraic for a modulated structure`,
      found: "none",
      remedy: "a magnetic CIF lists its operators with time reversal",
    });
  return texts.map((text) => readingValue(reader, text, () => parseMagneticTriplet(text.text)));
}

const identity = parseMagneticTriplet("x,y,z,+1");

/** The centring loop may be missing: then the operation loop holds everything. */
function centringsOf(reader: BlockReader): readonly MagneticOperator[] {
  const texts = textsOf(reader, centringNames);
  if (texts.length === 0) return [identity];
  return texts.map((text) => readingValue(reader, text, () => parseMagneticTriplet(text.text)));
}

function textsOf(reader: BlockReader, names: readonly string[]): CifText[] {
  for (const name of names) {
    const texts = valuesOf(reader, name).flatMap((value) => saidText(value) ?? []);
    if (texts.length > 0) return texts;
  }
  return [];
}

function childOf(reader: BlockReader): BasisChange | null {
  const text = firstText(reader, "_parent_space_group_child_transform_Pp_abc");
  return text && readingValue(reader, text, () => parseBasisChange(text.text));
}

function modulationOf(reader: BlockReader): MagneticStructure["modulation"] {
  const operators = textsOf(reader, [
    "_space_group_symop_magn_ssg_operation_algebraic",
    "_space_group_symop_magn_ssg_algebraic",
  ]);
  if (operators.length === 0) return null;
  const rows = rowsOf(reader, "_cell_wave_vector_x", ["_cell_wave_vector_y", "_cell_wave_vector_z"]);
  const [row] = rows;
  const [x, y, z] = ["x", "y", "z"].map(
    (axis) => numberOf(row?.value(`_cell_wave_vector_${axis}`) ?? null)?.value ?? Number.NaN,
  ) as [number, number, number];
  if (rows.length !== 1 || ![x, y, z].every(Number.isFinite))
    return fail("cif-missing", `the data block ${reader.block.code} needs one modulation vector`, {
      where: blockPlace(reader),
      expected: "_cell_wave_vector_x, _y and _z once",
      found: `${rows.length} rows`,
      remedy: "structures with several modulation vectors are not read",
    });
  const centrings = textsOf(reader, ["_space_group_symop_magn_ssg_centering_algebraic"]);
  return {
    waveVector: [x, y, z],
    operators: operators.map(({ text }) => text),
    centrings: centrings.length === 0 ? ["x1,x2,x3,x4,+1"] : centrings.map(({ text }) => text),
  };
}

const positionNames = ["_atom_site_fract_x", "_atom_site_fract_y", "_atom_site_fract_z"] as const;

function atomsOf(reader: BlockReader, cell: Cell): readonly MagneticAtom[] {
  const problems: Problem[] = [];
  const sites = new Map(
    rowsOf(reader, "_atom_site_label", [...positionNames, "_atom_site_type_symbol"]).map((row) => [
      saidText(row.value("_atom_site_label"))?.text ?? "",
      row,
    ]),
  );
  const waves = wavesOf(reader, problems);
  const atoms = momentRows(reader).flatMap(({ label, row, start }): MagneticAtom[] => {
    const where = placeIn(reader.document, start);
    const site = sites.get(label);
    if (site === undefined) {
      problems.push(missingSite(label, where));
      return [];
    }
    const position = positionNames.map((name) => number(site.value(name), name, where, problems));
    const crystal = momentIn(row, cell, where, problems);
    const symbol = saidText(site.value("_atom_site_type_symbol"))?.text ?? null;
    return [
      {
        label,
        ion: symbol === null ? null : (ionOfSymbol(symbol)?.text ?? null),
        position: position as [number, number, number],
        crystal,
        waves: waves.get(label) ?? [],
        place: where,
      },
    ];
  });
  if (problems.length > 0) throw new KvaneError(problems);
  if (atoms.length === 0)
    return fail("cif-missing", `the data block ${reader.block.code} gives no atom a moment`, {
      where: blockPlace(reader),
      expected: "_atom_site_moment_label and _atom_site_moment_crystalaxis_x, _y, _z",
      found: "none",
      remedy: "choose another block with --block, or give a file with moments",
    });
  return atoms;
}

function momentRows(reader: BlockReader) {
  const rows = rowsOf(reader, "_atom_site_moment_label", momentNames);
  return rows.map((row) => ({
    label: saidText(row.value("_atom_site_moment_label"))?.text ?? "",
    row,
    start: row.start,
  }));
}

const momentNames = [
  ...["crystalaxis", "Cartn"].flatMap((kind) => ["x", "y", "z"].map((axis) => `_atom_site_moment_${kind}_${axis}`)),
  ...["mx", "my", "mz"].map((axis) => `_atom_site_moment_crystalaxis_${axis}`),
  ...["modulus", "polar", "azimuthal"].map((name) => `_atom_site_moment_spherical_${name}`),
];

function missingSite(label: string, where: Partial<Place>): Problem {
  return problem("cif-missing", `the moment of \`${label}\` belongs to no atom of the block`, {
    where,
    expected: "a label of _atom_site_label",
    found: label,
    remedy: "correct the label",
  });
}

function number(value: CifValue | null, name: string, where: Partial<Place>, problems: Problem[]): number {
  const read = numberOf(value);
  if (read !== null) return read.value;
  problems.push(
    problem("cif-value", `${name} ${whyNoNumber(value?.raw ?? "")}`, {
      where,
      expected: "a number",
      found: value === null ? "nothing" : value.raw.slice(0, 60),
      remedy: "correct it",
    }),
  );
  return 0;
}

/** Cosine and sine amplitudes by atom, one entry for each order of the harmonic. */
function wavesOf(reader: BlockReader, problems: Problem[]): ReadonlyMap<string, MagneticAtom["waves"]> {
  const orders = new Map(
    rowsOf(reader, "_atom_site_Fourier_wave_vector_seq_id", ["_atom_site_Fourier_wave_vector_q1_coeff"]).map((row) => [
      saidText(row.value("_atom_site_Fourier_wave_vector_seq_id"))?.text ?? "",
      numberOf(row.value("_atom_site_Fourier_wave_vector_q1_coeff"))?.value ?? 1,
    ]),
  );
  const found = new Map<
    string,
    { order: number; cosine: [number, number, number]; sine: [number, number, number] }[]
  >();
  const own = locate(reader, "_atom_site_moment_Fourier_atom_site_label");
  if (own === null) return found;
  const parameterNames = ["_atom_site_moment_Fourier_param_cos", "_atom_site_moment_Fourier_param_sin"];
  const parameters = new Map(
    rowsOf(reader, "_atom_site_moment_Fourier_param_id", parameterNames).map((row) => [
      saidText(row.value("_atom_site_moment_Fourier_param_id"))?.text ?? "",
      row,
    ]),
  );
  const names = [
    "_atom_site_moment_Fourier_id",
    "_atom_site_moment_Fourier_wave_vector_seq_id",
    "_atom_site_moment_Fourier_axis",
    ...parameterNames,
  ];
  for (const row of rowsOf(reader, "_atom_site_moment_Fourier_atom_site_label", names)) {
    const text = (name: string) => saidText(row.value(name))?.text ?? "";
    const where = placeIn(reader.document, row.start);
    const axis = ["x", "y", "z"].indexOf(text("_atom_site_moment_Fourier_axis"));
    if (axis < 0) {
      problems.push(
        problem("cif-value", "a modulation is along an axis that is not read", {
          where,
          expected: "x, y or z: the crystal axes",
          found: text("_atom_site_moment_Fourier_axis"),
          remedy: "give the amplitudes along the crystal axes",
        }),
      );
      continue;
    }
    // The parameters may stand in the same loop or in one of their own, joined by the id.
    const holder =
      row.value(parameterNames[0] as string) === null ? parameters.get(text("_atom_site_moment_Fourier_id")) : row;
    const order = orders.get(text("_atom_site_moment_Fourier_wave_vector_seq_id")) ?? 1;
    const label = text("_atom_site_moment_Fourier_atom_site_label");
    const list = found.get(label) ?? [];
    let entry = list.find((one) => one.order === order);
    if (entry === undefined) {
      entry = { order, cosine: [0, 0, 0], sine: [0, 0, 0] };
      list.push(entry);
    }
    entry.cosine[axis] = number(
      holder?.value(parameterNames[0] as string) ?? null,
      "the cosine amplitude",
      where,
      problems,
    );
    entry.sine[axis] = number(
      holder?.value(parameterNames[1] as string) ?? null,
      "the sine amplitude",
      where,
      problems,
    );
    found.set(label, list);
  }
  return found;
}
