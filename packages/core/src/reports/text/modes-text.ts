import type { KRecord } from "../records/common.js";
import type { ConventionRecord, IrrepModesRecord, ModeRecord, ModesRecord, SiteModesRecord } from "../records/modes.js";
import { axesText, waveText } from "./convention-text.js";
import { matrixText } from "./irreps-text.js";
import { fields, lineWidth, paragraph, section, table, wideTable, widthOf } from "./layout.js";
import { cellText, counted, groupText, kForm, kText, minusKText, positionText } from "./names.js";
import { littleGroupSection } from "./star-text.js";

/** What the parts of a report on modes need of the whole. */
export type ModesFrame = Pick<ModesRecord, "convention" | "cell" | "minusK" | "k">;

export function modesText(record: ModesRecord): string[] {
  return [
    ...section(
      "Wave vector",
      fields([
        ["Group", groupText(record.group)],
        ...(record.cell ? [["Cell", cellText(record.cell)] as const] : []),
        ["k", kText(record.k)],
        ["−k", minusKText(record.minusK)],
        ["Little co-group", `${record.littleGroup.symbol}, order ${record.littleGroup.order}`],
      ]),
    ),
    ...littleGroupSection(record.littleGroup),
    ...record.sites.map((site) => inComponents(site, record.k)).flatMap((site) => siteText(site, record)),
    ...letterSection(record),
  ];
}

/**
 * The exact texts of a site with kx, ky, kz in exponents in place of the letters of k, as the tables of what is allowed
 * have it: there u, v, w are amplitudes. Letters that are no component by themselves stay; so do those on other arms.
 */
export function inComponents(site: SiteModesRecord, k: KRecord): SiteModesRecord {
  const names = componentNames(k);
  const renamed = (text: string) =>
    text.replace(/e\^\{[^}]*\}/g, (power) => power.replace(/[uvw]/g, (letter) => names.get(letter) ?? letter));
  const all = (rows: readonly (readonly string[])[]) => rows.map((row) => row.map(renamed));
  return {
    ...site,
    irreps: site.irreps.map((irrep) => ({
      ...irrep,
      modes: irrep.modes.map((mode) => ({ ...mode, exact: all(mode.exact) })),
      minusK: irrep.minusK && { ...irrep.minusK, exact: all(irrep.minusK.exact) },
    })),
  };
}

/** `u` → `ky` where the second component of k is just u. */
function componentNames({ components }: KRecord): ReadonlyMap<string, string> {
  const names = new Map<string, string>();
  for (const [axis, component] of components.entries())
    if (/^[uvw]$/.test(component) && !names.has(component)) names.set(component, ["kx", "ky", "kz"][axis] ?? component);
  return names;
}

/** What letters in exponents mean. */
function exponentText({ k, sites }: ModesRecord): string {
  const letters = new Set(k.components.flatMap((component) => component.match(/[uvw]/g) ?? []));
  const [names, arms] = [componentNames(k), sites.some(({ starModes }) => starModes !== null)];
  const left = [...letters].some((letter) => !names.has(letter));
  if (!left && !arms) return "In exponents kx, ky, kz are the components of k.";
  const where = left ? "in those of B and of basis vectors" : "on the other arms";
  return `In exponents kx, ky, kz are the components of k; ${where} u, v, w are its letters.`;
}

/** Everything about one site: orbit, decomposition and, irrep by irrep, what is allowed and the basis vectors. */
function siteText(site: SiteModesRecord, frame: ModesFrame): string[] {
  return [
    ...section(
      `Site ${site.label}`,
      fields([
        ["Position", `${positionText(site.position)}, site symmetry ${site.siteSymmetry}`],
        ["Atoms", `${site.multiplicity} in the cell, ${site.orbit.length} in the primitive cell`],
        ["Little-group orbits", suborbitText(site)],
        ["Decomposition", decompositionText(site)],
      ]),
    ),
    ...site.irreps.filter(({ multiplicity }) => multiplicity > 0).flatMap((irrep) => irrepText(site, irrep, frame)),
    ...armSections(site, frame),
    ...readSection(site),
  ];
}

/** `3 Γ1 + 2 Γ4`, multiplicities in front as the trade writes them. */
export function decompositionText(site: SiteModesRecord): string {
  const terms = site.irreps
    .filter(({ multiplicity }) => multiplicity > 0)
    .map(({ label, multiplicity }) => (multiplicity === 1 ? label : `${multiplicity} ${label}`));
  return terms.length > 0 ? terms.join(" + ") : "nothing";
}

export function suborbitText(site: SiteModesRecord): string {
  return site.suborbits.map((atoms) => atoms.map((atom) => atom + 1).join(" ")).join(" | ");
}

function irrepText(site: SiteModesRecord, irrep: IrrepModesRecord, frame: ModesFrame): string[] {
  return [
    ...section(
      `${irrep.label} on ${site.label}: dimension ${irrep.dimension}, ${countText(irrep.multiplicity)}, ${irrep.reality}`,
      fields([
        ["Free real parameters", parameterText(irrep)],
        ...relationFields(site, irrep),
        ...sizeFields(irrep, frame),
        ...(irrep.vanishingAtoms.length > 0
          ? [["Atoms without a moment", irrep.vanishingAtoms.map((atom) => atom + 1).join(", ")] as const]
          : []),
      ]),
      constraintTables(site, irrep, frame.convention),
      [""],
      modeTable(site, irrep.dimension, irrep.modes, frame.convention),
    ),
  ];
}

/** `once`, `twice`, `3 times`. */
function countText(count: number): string {
  return count === 1 ? "once" : count === 2 ? "twice" : `${count} times`;
}

export function parameterText(irrep: IrrepModesRecord): string {
  const relation = irrep.freeParametersWithMinusK;
  if (relation === irrep.freeParameters) return String(irrep.freeParameters);
  return `${irrep.freeParameters}; ${relation} with the relation between k and −k of one order parameter`;
}

export function relationFields(site: SiteModesRecord, { label, minusK }: IrrepModesRecord): [string, string][] {
  if (minusK === null) return [];
  const partner = minusK.partner === label ? "" : ` to those of ${minusK.partner}`;
  const swapped = minusK.suborbitImages.flatMap((image, orbit) =>
    image > orbit ? [`${orbit + 1} ↔ ${image + 1}`] : [],
  );
  const orbits = site.suborbits.length > 1 && swapped.length > 0 ? `, little-group orbits ${swapped.join(", ")}` : "";
  return [
    ["g₀, which takes k to −k", `${minusK.operator}${orbits}`],
    [`B on the copies${partner}`, matrixText(minusK.exact)],
  ];
}

export function sizeFields(irrep: IrrepModesRecord, { cell, k }: ModesFrame): [string, string][] {
  const { equalAmplitude, constantMoment, collinear } = irrep;
  if (equalAmplitude === null || constantMoment === null || collinear === null) {
    const needs = cell === null ? "a cell (--cell)" : `a number for every letter of k = ${kForm(k)}`;
    return [["Sizes of moments", `not computed: they need ${needs}`]];
  }
  const possible = (value: boolean) => (value ? "possible" : "none found");
  return [
    ["Equal |S| on all atoms", possible(equalAmplitude)],
    ["Equal moments in all cells", possible(constantMoment)],
    ["Collinear", collinear ? "for all amplitudes" : "not forced"],
  ];
}

/** The allowed Fourier component of each atom: plain, and beside it that of one order parameter; below in μB. */
function constraintTables(site: SiteModesRecord, irrep: IrrepModesRecord, convention: ConventionRecord): string[] {
  const wave = waveText(convention);
  const lattice = constraintTable(site, irrep.constraint, irrep.minusK?.constraint ?? null, [
    `allowed S along a, b, c, with ${wave}`,
    "of one order parameter",
  ]);
  if (irrep.constraintCrystal === null && !irrep.minusK?.constraintCrystal) return lattice;
  const crystal = constraintTable(
    site,
    irrep.constraintCrystal ?? irrep.constraint,
    irrep.minusK && (irrep.minusK.constraintCrystal ?? irrep.minusK.constraint),
    [`allowed S in μB along the unit vectors of a, b, c, with ${wave}`, "of one order parameter"],
  );
  return [...lattice, "", ...crystal];
}

function constraintTable(
  site: SiteModesRecord,
  plain: readonly string[],
  one: readonly string[] | null,
  [title, oneTitle]: readonly [string, string],
): string[] {
  const atoms = [{ title: "atom", align: "right" as const }, { title: "position" }];
  const rows = site.orbit.map((position, atom) => [
    String(atom + 1),
    positionText(position),
    plain[atom] ?? "(0, 0, 0)",
    ...(one ? [one[atom] ?? "(0, 0, 0)"] : []),
  ]);
  if (one === null) return table([...atoms, { title }], rows);
  const widest = (column: number, head: string) =>
    Math.max(widthOf(head), ...rows.map((row) => widthOf(row[column] ?? "")));
  const width = 2 + 4 + 2 + widest(1, "position") + 2 + widest(2, title) + 2 + widest(3, oneTitle);
  if (width <= lineWidth()) return table([...atoms, { title }, { title: oneTitle }], rows);
  return [
    ...table(
      [...atoms, { title }],
      rows.map((row) => row.slice(0, 3)),
    ),
    "",
    ...table(
      [...atoms, { title: `the same ${oneTitle}` }],
      rows.map(([atom = "", position = "", , last = ""]) => [atom, position, last]),
    ),
  ];
}

function modeTable(
  site: SiteModesRecord,
  dimension: number,
  modes: readonly ModeRecord[],
  convention: ConventionRecord,
): string[] {
  const partner = dimension > 1;
  const title = `${counted(modes.length, "basis vector")}${partner ? ", copy.partner," : ""} ${axesText(convention.components)}, with ${waveText(convention)}`;
  return [
    `  ${title}`,
    ...wideTable(
      [{ title: "atom", align: "right" }],
      modes.map(({ copy, partner: index }) => ({ title: partner ? `${copy}.${index}` : String(copy) })),
      site.orbit.map((_, atom) => ({
        fixed: [String(atom + 1)],
        cells: modes.map((mode) => vectorText(mode, atom, convention)),
      })),
    ),
  ];
}

/** Exact in lattice components, else numbers. */
function vectorText({ exact, moments }: ModeRecord, atom: number, { components }: ConventionRecord): string {
  if (components === "lattice" || moments === null) return `(${(exact[atom] ?? []).join(", ")})`;
  return `(${(moments[atom] ?? []).map(([real, imaginary]) => complexText(real, imaginary)).join(", ")})`;
}

/** Decimals of a component of a basis vector in crystal or Cartesian axes. */
const shownDecimals = 5;

function complexText(real: number, imaginary: number): string {
  const [re, im] = [real, imaginary].map((value) => Number(value.toFixed(shownDecimals)) + 0) as [number, number];
  if (im === 0) return String(re);
  const part = `${Math.abs(im) === 1 ? "" : Math.abs(im)}i`;
  if (re === 0) return `${im < 0 ? "-" : ""}${part}`;
  return `${re}${im < 0 ? "-" : "+"}${part}`;
}

/** Basis vectors on the other arms: those of k stand with each irrep. */
function armSections(site: SiteModesRecord, { convention }: ModesFrame): string[] {
  return (site.starModes ?? []).flatMap(({ arm, operator, irreps }, index) =>
    irreps
      .filter(({ modes }) => modes.length > 0)
      .flatMap(({ label, modes }) =>
        section(
          `${label} on ${site.label}, arm ${index + 1} ${kForm(arm)} by ${operator}`,
          modeTable(site, Math.max(...modes.map(({ partner }) => partner)), modes, convention),
        ),
      ),
  );
}

/** Components from a file, and which irreps they are made of. */
function readSection({ label, orbit, irreps, read }: SiteModesRecord): string[] {
  if (read === null) return [];
  const present = read.irreps.filter((_, index) => (irreps[index]?.multiplicity ?? 0) > 0);
  const partner = irreps.some(({ dimension, multiplicity }) => dimension > 1 && multiplicity > 0);
  return [
    ...section(
      `Fourier components of ${label} from ${read.file}`,
      table(
        [{ title: "atom", align: "right" }, { title: "position" }, { title: `S along a, b, c, with ${waveText(own)}` }],
        orbit.map((position, atom) => [
          String(atom + 1),
          positionText(position),
          `(${(read.components[atom] ?? []).map(([re, im]) => complexText(re, im)).join(", ")})`,
        ]),
      ),
    ),
    ...section(
      "Their parts by irrep",
      table(
        [
          { title: "irrep" },
          { title: "share of Σ|S|²", align: "right" },
          { title: `amplitudes of the basis vectors of kvane's own convention${partner ? ", copy.partner" : ""}` },
        ],
        present.map((one) => [one.label, one.share.toFixed(shownDecimals), amplitudesText(one.amplitudes, partner)]),
      ),
    ),
  ];
}

const own: ConventionRecord = { exponent: "minus", phase: "lattice", factor: "one", components: "lattice" };

function amplitudesText(
  amplitudes: NonNullable<SiteModesRecord["read"]>["irreps"][number]["amplitudes"],
  partner: boolean,
): string {
  return amplitudes
    .map(
      ({ copy, partner: index, value: [re, im] }) => `${partner ? `${copy}.${index}` : copy}: ${complexText(re, im)}`,
    )
    .join("  ");
}

/** What the letters of the tables above mean, once. */
function letterSection(record: ModesRecord): string[] {
  const present = record.sites.flatMap(({ irreps }) => irreps.filter(({ multiplicity }) => multiplicity > 0));
  if (present.length === 0) return [];
  const several = present.some(({ dimension }) => dimension > 1);
  const one = present.filter(({ minusK }) => minusK !== null && minusK.constraint !== null);
  const half = record.minusK === "equivalent";
  return section(
    "Letters",
    paragraph(
      half
        ? "Letters are free real amplitudes, one for each real parameter of the physically irreducible representation."
        : "Letters are free complex amplitudes, one for each copy of the irrep (u, v, w first), each irrep with its own.",
    ),
    several && !half
      ? paragraph(
          "In u1, u2 the digit is the partner: u1, u2, … of one copy mix under the little group as the matrices of `kvane irreps` say; different copies (u1 and v1) never mix.",
        )
      : [],
    several && half
      ? paragraph(
          "Basis vectors are numbered copy.partner: partners of one copy mix under the little group as the matrices of `kvane irreps` say, copies never.",
        )
      : [],
    Object.keys(record.k.values).length > 0 || record.k.numeric === null ? paragraph(exponentText(record)) : [],
    record.cell !== null
      ? paragraph("In μB along the unit vectors of a, b, c a table is the same text unless it stands below its own.")
      : [],
    one.length > 0
      ? paragraph(
          `One order parameter: the relation between k and −k joins the copies. Letters are real there, complex where a star marks their complex conjugate; all S share one free phase.${
            one.some(({ dimension }) => dimension > 1)
              ? " ξ1, ξ2, … are the complex components of the order parameter."
              : ""
          }`,
        )
      : [],
  );
}
