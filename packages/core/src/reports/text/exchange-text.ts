import type {
  DiagramRecord,
  ExchangeAtKRecord,
  ExchangeLevelRecord,
  ExchangeRecord,
  GroundRecord,
  IrrepCountRecord,
  StationaryRecord,
} from "../records/exchange.js";
import { diagramLines } from "./exchange-diagram-text.js";
import { fields, paragraph, section, table, unbroken } from "./layout.js";
import { cellText, counted, decimals, groupText, kForm, kText, plain } from "./names.js";

export function exchangeText(record: ExchangeRecord): string[] {
  return [
    ...section(
      "Exchange model",
      fields([
        ["Group", groupText(record.group)],
        ["Cell", cellText(record.cell)],
        ["Atoms", atomsText(record)],
        ["Energy", "E = Σ J S·S, every bond once: J > 0 is antiferromagnetic"],
      ]),
    ),
    ...section(`Shells of neighbours (${record.shells.length})`, shellTable(record), [""], shellNotes(record)),
    ...(record.ground === null
      ? section(
          "Minimum",
          paragraph(
            'No constant acts. Name them with --j "1 1.0" --j "2b -0.3" or in the study: exchange: [{shell: 1, j: 1.0}].',
          ),
        )
      : groundSections(record, record.ground)),
    ...record.atK.flatMap((one) => levelSection(record, one)),
    ...configurationSection(record),
    ...(record.stationary ? stationarySection(record.stationary) : []),
    ...(record.diagram ? diagramSection(record.diagram) : []),
  ];
}

/** What a report of the whole job says of the model in short: names and values. */
export function exchangeSummary(record: ExchangeRecord): [string, string][] {
  const { ground } = record;
  return [
    ["Constants", constantsText(record)],
    ["Atoms", atomsText(record)],
    ...(ground === null ? [] : groundFields(record, ground)),
    ...record.atK.flatMap(({ k, from, above }): [string, string][] =>
      from === "given" ? [[`At k = ${kText(k)}`, aboveText(above)]] : [],
    ),
  ];
}

function constantsText({ shells }: ExchangeRecord): string {
  const classes = shells.flatMap(({ classes }) => classes).filter(({ j }) => j !== null);
  return `${classes.map(({ name, j }) => unbroken(`J${name} = ${plain(j ?? 0)}`)).join(", ")}; E = Σ J S·S, every bond once`;
}

function aboveText(above: number): string {
  return Math.abs(above) < 1e-8 ? "the least energy" : `${energyText(above)} above the least energy`;
}

function atomsText({ atoms }: ExchangeRecord): string {
  const labels = [...new Set(atoms.map(({ label }) => label))];
  const each = labels.map((label) => {
    const own = atoms.filter((atom) => atom.label === label);
    const length = own[0]?.length ?? 1;
    return unbroken(`${own.length} ${label}${length === 1 ? "" : `, |S| = ${plain(length)}`}`);
  });
  return `${each.join("; ")} in a primitive cell`;
}

function shellTable({ shells }: ExchangeRecord): string[] {
  return table(
    [
      { title: "bonds" },
      { title: "length/Å", align: "right" },
      { title: "between" },
      { title: "neighbours" },
      { title: "J", align: "right" },
      { title: "one of them along a, b, c" },
    ],
    shells.flatMap(({ distance, classes }) =>
      classes.map(({ name, labels, neighbours, j, vector }) => [
        name,
        decimals(distance, 4),
        unbroken(labels.join("–")),
        neighbours.map(({ label, count }) => unbroken(`${plain(count)} of each ${label}`)).join(", "),
        j === null ? "–" : plain(j),
        unbroken(vector.map((entry) => plain(Number(entry.toFixed(4)))).join(" ")),
      ]),
    ),
  );
}

function shellNotes({ shells }: ExchangeRecord): string[] {
  const split = shells.filter(({ classes }) => classes.length > 1);
  if (split.length === 0) return paragraph("Symmetry makes all bonds of each shell equal.");
  return paragraph(
    `Letters: bonds of one length that symmetry does not make equal (${split.map(({ number }) => number).join(", ")}). Each may have a J of its own.`,
  );
}

function groundSections(record: ExchangeRecord, ground: GroundRecord): string[] {
  return [
    ...section(
      "Minimum of J(k) over the whole zone",
      fields(groundFields(record, ground)),
      [""],
      table(
        [{ title: "k" }, { title: "±k pairs", align: "right" }],
        ground.vectors.map(({ k, pairs }) => [kText(k), String(pairs)]),
      ),
    ),
  ];
}

function groundFields(record: ExchangeRecord, ground: GroundRecord): [string, string][] {
  const { dimension, certificate, energy } = ground;
  return [
    ["Energy a spin", energyText(energy)],
    ["At", setText(ground)],
    ...(dimension === 0 ? [] : [["Set", dimensionSentence(ground)] as [string, string]]),
    ...(record.atoms.some(({ potential }) => potential !== 0)
      ? [["Bound", balanceText(record)] as [string, string]]
      : []),
    ["Spins", momentsText(ground)],
    ["Certificate", certificateText(certificate, ground)],
  ];
}

function setText({ vectors, dimension, freeDirections }: GroundRecord): string {
  const continuous = dimension > freeDirections;
  const shown = vectors.slice(0, 6).map(({ k }) => kText(k));
  const more = vectors.length > shown.length ? ` and ${vectors.length - shown.length} more` : "";
  return continuous ? `a continuous set of k, among them ${shown.join("; ")}${more}` : `${shown.join("; ")}${more}`;
}

function dimensionSentence({ dimension, freeDirections, manifolds }: GroundRecord): string {
  const whole = manifolds.length === 0 ? "" : `: all of ${manifolds.map(kForm).join(", ")}`;
  if (dimension === freeDirections)
    return `isolated as far as the bonds reach; no bond acts along ${counted(freeDirections, "direction")} of k, which stays open${whole}`;
  const what = ["", "a line or ring of k", "a surface of k", "all k"][dimension - freeDirections] ?? "";
  const open =
    freeDirections === 0 ? "" : `; no bond acts along ${counted(freeDirections, "direction")} of k, which stays open`;
  return `${what} with one and the same energy: no single k is preferred${whole === "" ? "" : `; in it${whole}`}${open}`;
}

/** Sites that symmetry does not relate are weighed against each other. */
function balanceText({ atoms }: ExchangeRecord): string {
  const labels = [...new Set(atoms.map(({ label }) => label))];
  const each = labels.map((label) =>
    unbroken(`${label} ${energyText(atoms.find((atom) => atom.label === label)?.potential ?? 0)}`),
  );
  return `tightened by site potentials that add up to nothing for full spins, and are counted in every energy below (${each.join(", ")})`;
}

function momentsText({ constantMoments: { answer, k, spins, short } }: GroundRecord): string {
  if (answer === "reached") {
    const how =
      k.length === 1 ? `one k, ${k.map(kText).join("")}` : `${k.length} k at once, ${k.map(kText).join("; ")}`;
    return `a ${spins} arrangement of full spins reaches this energy with ${how}: it is the ground state of the model`;
  }
  if (answer === "only a bound")
    return `no arrangement of full spins at these k reaches this energy (${short.join(", ")} would be short): it is a lower bound, and the ground state may have another k`;
  return "no arrangement of full spins that reaches this energy was found: take it as a lower bound";
}

function certificateText(certificate: GroundRecord["certificate"], { energy }: GroundRecord): string {
  const { boxes, smallestBox, lowerBound, exhaustive, stopped } = certificate;
  if (!exhaustive) return `not complete: ${stopped ?? "stopped"}; no energy below ${energyText(lowerBound)} so far`;
  const gap = energy - lowerBound;
  return `whole zone in ${boxes} boxes, the smallest ${smallestBox.toPrecision(2)} Å⁻¹: no k has less than this by more than ${gap < 1e-12 ? "rounding" : gap.toPrecision(2)}`;
}

/** Eight significant digits, as short as they are: computed k are known to about nine. */
function energyText(value: number): string {
  return String(Number(value.toPrecision(8)) + 0);
}

function levelSection(record: ExchangeRecord, one: ExchangeAtKRecord): string[] {
  const title = one.from === "given" ? `Energies at the given k = ${kText(one.k)}` : `Energies at k = ${kText(one.k)}`;
  const above = one.from === "given" ? paragraph(`Lowest here ${energyText(one.above)} a spin above the minimum.`) : [];
  return section(
    title,
    above,
    above.length > 0 ? [""] : [],
    table(
      [
        { title: "energy", align: "right" },
        { title: "times", align: "right" },
        { title: "irreps of the sites" },
        { title: "irreps of moments" },
        { title: "weight of atoms" },
      ],
      one.levels.map((level) => [
        energyText(level.energy),
        String(level.degeneracy),
        countsText(level.irreps),
        countsText(level.magneticIrreps),
        weightsText(record, level),
      ]),
    ),
  );
}

function countsText(counts: readonly IrrepCountRecord[]): string {
  return counts
    .map(({ label, multiplicity }) => (multiplicity === 1 ? label : unbroken(`${multiplicity} ${label}`)))
    .join(" + ");
}

const shownAtoms = 8;

function weightsText({ atoms }: ExchangeRecord, { weights, phases }: ExchangeLevelRecord): string {
  const texts = atoms.map(({ label }, index) => {
    const weight = weights[index] as number;
    const phase = phases?.[index] ?? null;
    const turns = phase === null || weight < 1e-9 ? "" : phase === 0 ? " 0" : ` ${plain(Number(phase.toFixed(4)))}`;
    return unbroken(`${label} ${plain(Number(weight.toFixed(4)))}${turns === "" ? "" : ` at${turns}`}`);
  });
  const shown = texts.slice(0, shownAtoms).join(", ");
  return texts.length > shownAtoms ? `${shown}, …` : shown;
}

function configurationSection({ configurations }: ExchangeRecord): string[] {
  if (configurations.length === 0) return [];
  return section(
    "Energies of arrangements",
    table(
      [
        { title: "id" },
        { title: "k" },
        { title: "direction" },
        { title: "amplitudes", align: "right" },
        { title: "lowest", align: "right" },
        { title: "highest", align: "right" },
      ],
      configurations.map((one) => [
        one.id,
        kText(one.k),
        one.direction,
        String(one.amplitudes),
        energyText(one.lowest),
        energyText(one.highest),
      ]),
    ),
    [""],
    paragraph(
      "A spin, for moments of length 1 on the average of the atoms; with several amplitudes the energies run from lowest to highest.",
    ),
  );
}

function stationarySection(answer: StationaryRecord): string[] {
  const names = answer.constants.map(({ name }) => name);
  const relations = answer.relations.flatMap((one) => [
    ...(one.text === null ? [] : [[`Relation in ${one.letter}`, one.text] as const]),
    [`Slope in ${one.letter}`, sumText(one.slopes, names)] as const,
    ...(answer.fixedBySymmetry ? [[`Curvature in ${one.letter}`, sumText(one.curvatures, names)] as const] : []),
  ]);
  const shared = answer.constants.filter(({ classes }) => classes.length > 1);
  const validity = answer.fixedBySymmetry
    ? "Symmetry fixes the eigenvector of this level, so the slope is linear in the constants as long as the level is the lowest: it must be 0, and the curvature above 0, for the minimum to lie at this k."
    : "The eigenvector depends on the constants: the slope is that near the constants of the model.";
  return section(
    `What k = ${kText(answer.k)} asks of the constants`,
    fields(relations),
    [""],
    paragraph([validity, ...shared.map(sharedText)].join(" ")),
    answer.needed.length === 0 ? [] : [""],
    answer.needed.length === 0 ? [] : neededTable(answer),
    answer.needed.length === 0 || answer.potentials === "none"
      ? []
      : ["", ...paragraph(potentialText[answer.potentials])],
  );
}

/** A constant that several kinds of bonds share. */
function sharedText({ name, classes }: StationaryRecord["constants"][number]): string {
  return name === classes.join("=")
    ? `J${name} is one constant.`
    : `J${name} is one constant of the bonds ${classes.join(" and ")}.`;
}

function neededTable({ needed }: StationaryRecord): string[] {
  return table(
    [
      { title: "constant" },
      { title: "J needed, others as they are", align: "right" },
      { title: "along the line" },
      { title: "in the whole zone" },
    ],
    needed.map((one) => [
      one.name,
      one.j === null ? "none found" : energyText(one.j),
      one.j === null ? "–" : one.along,
      one.j === null ? "–" : zoneText(one),
    ]),
  );
}

function zoneText({ lowest, oneOfMany }: StationaryRecord["needed"][number]): string {
  if (lowest === null) return "not decided";
  if (!lowest) return "another k is lower";
  return oneOfMany ? "one of a continuous set of lowest k" : "the lowest";
}

const potentialText = {
  "balanced anew":
    "Another constant changes the site potentials: they were balanced anew for each value, and the whole zone was searched with them.",
  "those of the model":
    "The site potentials are those of the model above. Other constants would change them, so that neither these values nor which k is then the lowest is decided.",
} as const;

function sumText(factors: readonly number[], names: readonly string[]): string {
  return factors
    .map((factor, index) =>
      `${factor < 0 ? "−" : index === 0 ? "" : "+"} ${unbroken(`${Number(Math.abs(factor).toPrecision(6))} J${names[index]}`)}`.trim(),
    )
    .join(" ");
}

/** The phases and where they meet. */
export function diagramSection(diagram: DiagramRecord): string[] {
  return section(`Phase diagram (${diagram.axes.map(({ name }) => `J${name}`).join(", ")})`, diagramLines(diagram));
}
