import { type Assumption, KvaneError, type Place, type Problem, problem } from "../../errors/index.js";
import { fractionalPart, mapVector, type RationalVector } from "../../numbers/index.js";
import { type BlockReader, type CifRow, firstText, locate, rowsOf, valuesOf } from "./block-reader.js";
import { notANumber } from "./cell.js";
import type { CifValue } from "./document.js";
import { elementsOfFormula, type Ion, ionOf, ionOfLabel, ionOfSymbol } from "./ions.js";
import { numberOf, readCifRational } from "./numbers.js";
import { blockPlace, placeIn, someOf } from "./places.js";
import { siteWarnings } from "./site-warnings.js";
import { isInapplicable, isUnknown, saidText } from "./values.js";

/** An atom of a CIF. */
export interface CifSite {
  /** Without blanks, and unlike all others: what a study can use. */
  readonly label: string;
  readonly ion: Ion | null;
  /** Exact as written, without uncertainties; null where a coordinate is `?` or `.`. */
  readonly position: RationalVector | null;
  /** As written, `0.1372(4)`. */
  readonly written: readonly [string, string, string];
  /** 1 where the file does not say it. */
  readonly occupancy: number;
  /** `assembly/group` of a disordered part, null for ordered atoms. */
  readonly disorder: string | null;
  /** Label of an earlier site with the very same coordinates. */
  readonly shares: string | null;
  readonly place: Partial<Place>;
}

export interface CifSites {
  readonly sites: readonly CifSite[];
  readonly assumed: readonly Assumption[];
  readonly warnings: readonly Problem[];
}

const coordinates = ["_atom_site_fract_x", "_atom_site_fract_y", "_atom_site_fract_z"] as const;
const others = [
  "_atom_site_label",
  "_atom_site_type_symbol",
  "_atom_site_occupancy",
  "_atom_site_disorder_assembly",
  "_atom_site_disorder_group",
  "_atom_site_calc_flag",
];

/**
 * The atoms of a block. What a study cannot say (occupancies, disorder, unknown coordinates, shared positions) is
 * warned about; dummy atoms are left out.
 *
 * @throws `cif-missing` without atoms or fractional coordinates, `cif-value`, all problems at once with their places
 */
export function readSites(reader: BlockReader): CifSites {
  requireCoordinates(reader);
  requireOneLoop(reader);
  const problems: Problem[] = [];
  const types = atomTypes(reader);
  const labels = new Map<string, number>();
  const taken = new Map<string, string>();
  const notes: SiteNotes = { dummies: [], relabelled: [], guessed: [], unknown: [] };
  const sites = rowsOf(reader, coordinates[0], [...coordinates, ...others]).flatMap((row, index) => {
    const site = readSite(reader, row, index, types, labels, notes, problems);
    if (site === null) return [];
    const key = site.position === null ? null : mapVector(site.position, fractionalPart).join(" ");
    const shares = key === null ? null : (taken.get(key) ?? null);
    if (key !== null && shares === null) taken.set(key, site.label);
    return [{ ...site, shares }];
  });
  if (problems.length > 0) throw new KvaneError(problems.slice(0, mostProblems));
  return { sites, assumed: guessNote(notes.guessed), warnings: siteWarnings(sites, notes, blockPlace(reader)) };
}

/** A file in which a whole column is wrong need not say so a hundred thousand times. */
const mostProblems = 20;

/** What happened while the sites were read. */
export interface SiteNotes {
  readonly dummies: string[];
  readonly relabelled: string[];
  readonly guessed: string[];
  /** Sites whose element cannot be told, with the type symbol where there is one. */
  readonly unknown: string[];
}

function requireCoordinates(reader: BlockReader): void {
  const missing = coordinates.filter((name) => locate(reader, name) === null);
  if (missing.length === 0) return;
  const cartesian = locate(reader, "_atom_site_Cartn_x") !== null;
  throw new KvaneError([
    problem("cif-missing", `the data block ${reader.block.code} has no fractional coordinates`, {
      where: blockPlace(reader),
      expected: `${coordinates.join(", ")} in the loop of the atoms`,
      found: cartesian ? "Cartesian coordinates alone" : `no ${missing.join(", ")}`,
      remedy: "choose another block with --block, or give the sites beside the CIF: --site, `sites:` in the study",
    }),
  ]);
}

/** Columns of different loops have no rows together. */
function requireOneLoop(reader: BlockReader): void {
  const [first, ...more] = coordinates.map((name) => locate(reader, name));
  const apart = more.find((one) => one?.loop !== first?.loop);
  if (!apart) return;
  throw new KvaneError([
    problem("cif-missing", `${apart.name} stands in another loop than ${first?.name}`, {
      where: placeIn(reader.document, apart.start),
      expected: `${coordinates.join(", ")} in the loop of the atoms`,
      found: "columns of different loops",
      remedy: "put the three coordinates into one loop",
    }),
  ]);
}

/** What the list of atom types and the formula say. */
interface AtomTypes {
  readonly charges: ReadonlyMap<string, number>;
  readonly elements: ReadonlySet<string>;
}

function atomTypes(reader: BlockReader): AtomTypes {
  const charges = new Map<string, number>();
  const elements = new Set<string>();
  for (const row of rowsOf(reader, "_atom_type_symbol", ["_atom_type_oxidation_number"])) {
    const symbol = saidText(row.value("_atom_type_symbol"))?.text ?? "";
    const ion = ionOfSymbol(symbol);
    if (ion) elements.add(ion.element);
    const charge = numberOf(row.value("_atom_type_oxidation_number"))?.value;
    if (charge !== undefined && Number.isInteger(charge)) charges.set(symbol, charge);
  }
  const formula = firstText(reader, "_chemical_formula_sum");
  for (const element of elementsOfFormula(formula?.text ?? "")) elements.add(element);
  for (const value of valuesOf(reader, "_atom_site_type_symbol").slice(0, 1000)) {
    const ion = ionOfSymbol(saidText(value)?.text ?? "");
    if (ion) elements.add(ion.element);
  }
  return { charges, elements };
}

function readSite(
  reader: BlockReader,
  row: CifRow,
  index: number,
  types: AtomTypes,
  labels: Map<string, number>,
  notes: SiteNotes,
  problems: Problem[],
): CifSite | null {
  const symbol = saidText(row.value("_atom_site_type_symbol"))?.text ?? null;
  const written = saidText(row.value("_atom_site_label"))?.text ?? `${symbol ?? "site"}${index + 1}`;
  if (saidText(row.value("_atom_site_calc_flag"))?.text.toLowerCase() === "dum") {
    notes.dummies.push(written);
    return null;
  }
  const label = ownLabel(written, labels);
  if (label !== written) notes.relabelled.push(`${written} as ${label}`);
  const values = coordinates.map((name) => row.value(name)) as [CifValue, CifValue, CifValue];
  const position = readPosition(reader, values, problems);
  return {
    label,
    ion: ionOfSite(symbol, written, types, notes),
    position,
    written: [values[0].raw, values[1].raw, values[2].raw],
    occupancy: readOccupancy(reader, row, problems),
    disorder: disorderOf(row),
    shares: null,
    place: placeIn(reader.document, row.start),
  };
}

/** A label that a study can use: without blanks, and not one that another site has. */
function ownLabel(written: string, labels: Map<string, number>): string {
  const plain = written.trim().replace(/\s+/g, "_") || "site";
  let label = plain;
  for (let count = labels.get(plain) ?? 0; labels.has(label); count++) {
    label = `${plain}_${count + 1}`;
    labels.set(plain, count + 1);
  }
  labels.set(label, 1);
  return label;
}

function readPosition(
  reader: BlockReader,
  values: readonly [CifValue, CifValue, CifValue],
  problems: Problem[],
): RationalVector | null {
  if (values.some((value) => isUnknown(value) || isInapplicable(value))) return null;
  const [x, y, z] = values.map((value, index) => {
    const number = value.shape === "text" && value.form === "bare" ? readCifRational(value.text) : null;
    if (number === null && problems.length < mostProblems)
      problems.push(
        notANumber(coordinates[index as 0 | 1 | 2], value, {
          file: reader.document.file,
          line: value.line,
          column: value.column,
        }),
      );
    return number;
  });
  return x && y && z ? [x, y, z] : null;
}

function readOccupancy(reader: BlockReader, row: CifRow, problems: Problem[]): number {
  const value = row.value("_atom_site_occupancy");
  if (value === null || isUnknown(value) || isInapplicable(value)) return 1;
  const number = numberOf(value);
  if (number === null && problems.length < mostProblems)
    problems.push(
      notANumber("_atom_site_occupancy", value, { file: reader.document.file, line: value.line, column: value.column }),
    );
  return number?.value ?? 1;
}

function disorderOf(row: CifRow): string | null {
  const group = saidText(row.value("_atom_site_disorder_group"))?.text ?? null;
  const assembly = saidText(row.value("_atom_site_disorder_assembly"))?.text ?? null;
  return group === null && assembly === null ? null : `${assembly ?? "."}/${group ?? "."}`;
}

/** From the type symbol, with the charge of the list of types where the symbol has none; else from the label. */
function ionOfSite(symbol: string | null, label: string, types: AtomTypes, notes: SiteNotes): Ion | null {
  const ion = symbol === null ? null : ionOfSymbol(symbol);
  if (ion !== null) {
    const charge = ion.charge ?? types.charges.get(symbol ?? "") ?? null;
    return ionOf(ion.element, charge);
  }
  const guess = symbol === null ? ionOfLabel(label, types.elements) : null;
  if (guess === null) notes.unknown.push(symbol === null ? label : `${label} (${symbol.trim().slice(0, 20)})`);
  else notes.guessed.push(`${label} is ${guess.text}`);
  return guess;
}

function guessNote(guessed: readonly string[]): Assumption[] {
  if (guessed.length === 0) return [];
  return [
    {
      what: "elements",
      value: someOf(guessed, mostGuesses),
      because: "the CIF has no type symbols, and labels begin with the element",
    },
  ];
}

/** Every element that is read from a label is a guess that has to be looked at, but not a thousand in one line. */
const mostGuesses = 20;
