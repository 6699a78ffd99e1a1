import type {
  BondTable,
  ConstantMoments,
  CosineTerm,
  ExchangeLevels,
  ExchangeModel,
  Ground,
  PhaseDiagram,
  StationaryAnswer,
} from "../../exchange/index.js";
import { waveVectorToJson } from "../../kvectors/index.js";
import { roundNumber } from "../../numbers/index.js";
import type {
  ConfigurationEnergyRecord,
  DiagramRecord,
  ExchangeAtKRecord,
  ExchangeRecord,
  GroundRecord,
  StationaryRecord,
} from "../records/exchange.js";
import { cellRecord, groupRecord, positionRecord } from "./names.js";

/** What was worked out of a model; null and empty for what was not asked. */
export interface ExchangeFindings {
  readonly ground: Ground | null;
  readonly constantMoments: ConstantMoments | null;
  readonly atK: readonly { readonly from: "minimum" | "given"; readonly levels: ExchangeLevels }[];
  readonly configurations: readonly ConfigurationEnergyRecord[];
  readonly stationary: StationaryAnswer | null;
  readonly diagram: PhaseDiagram | null;
}

/** The record of an exchange model for JSON, text and CSV. */
export function exchangeRecord(table: BondTable, model: ExchangeModel, found: ExchangeFindings): ExchangeRecord {
  const constants = new Map(model.couplings.map(({ bonds, j }) => [bonds.name, j]));
  return {
    group: groupRecord(table.group),
    cell: cellRecord(table.cell),
    energy: "sum over bonds of J S·S, every bond once; J > 0 is antiferromagnetic",
    atoms: table.atoms.map(({ label, position }, index) => ({
      label,
      position: positionRecord(position),
      length: model.lengths[index] as number,
      potential: roundNumber(model.potentials[index] as number),
    })),
    shells: table.shells.map(({ number, distance, classes }) => ({
      number,
      distance: roundNumber(distance),
      classes: classes.map(({ name, labels, bonds, neighbours, vector }) => ({
        name,
        labels,
        bonds: bonds.length,
        neighbours,
        vector: vector.map((entry) => roundNumber(entry)),
        j: constants.get(name) ?? null,
      })),
    })),
    ground: found.ground && found.constantMoments && groundRecord(found.ground, found.constantMoments),
    atK: found.atK.map((one) => atKRecord(one, found.ground)),
    configurations: found.configurations,
    stationary: found.stationary && stationaryRecord(found.stationary),
    diagram: found.diagram && diagramRecord(found.diagram),
  };
}

function groundRecord({ energy, set, certificate }: Ground, moments: ConstantMoments): GroundRecord {
  const { boxes, smallestBox, leaves, exhaustive, lowerBound, stopped } = certificate;
  return {
    energy,
    dimension: set.dimension,
    vectors: set.vectors.map(({ k, pairs }) => ({ k: waveVectorToJson(k), pairs })),
    manifolds: set.manifolds.map(waveVectorToJson),
    freeDirections: certificate.freeDirections,
    certificate: { boxes, smallestBox, leaves, exhaustive, lowerBound, stopped },
    constantMoments: { ...moments, k: moments.k.map(waveVectorToJson) },
  };
}

function atKRecord({ from, levels }: ExchangeFindings["atK"][number], ground: Ground | null): ExchangeAtKRecord {
  const lowest = levels.levels[0]?.energy ?? 0;
  return {
    k: waveVectorToJson(levels.k),
    from,
    above: roundNumber(lowest - (ground?.energy ?? lowest), Math.max(1e-12, Math.abs(lowest))),
    levels: levels.levels,
  };
}

function stationaryRecord(answer: StationaryAnswer): StationaryRecord {
  const names = answer.constants.map(({ name }) => name);
  return {
    k: waveVectorToJson(answer.k),
    constants: answer.constants,
    relations: answer.relations.map(({ letter, slopes, curvatures, cosines }) => ({
      letter,
      slopes,
      curvatures,
      text: cosines && relationText(cosines, names, letter),
    })),
    fixedBySymmetry: answer.fixedBySymmetry,
    slopes: answer.slopes,
    needed: answer.needed,
    potentials: answer.potentials,
  };
}

/** `J1 + 4 cos(2πu) J2 = 0`, divided by the first factor. */
function relationText(cosines: readonly (readonly CosineTerm[])[], names: readonly string[], letter: string): string {
  const unit = Math.abs(cosines.flat()[0]?.factor ?? 1);
  const parts = cosines.flatMap((terms, index) => {
    const name = `J${names[index]}`;
    const scaled = terms.map(({ factor, multiple }) => ({ factor: Number((factor / unit).toPrecision(10)), multiple }));
    if (scaled.length === 0) return [];
    const [only] = scaled;
    if (scaled.length === 1 && only) return [signed(only.factor, cosine(only.multiple, letter), name)];
    const inside = scaled
      .map(({ factor, multiple }) => signed(factor, cosine(multiple, letter), ""))
      .join(" ")
      .replace(/^\+ /, "");
    return [`+ (${inside}) ${name}`];
  });
  return `${parts.join(" ").replace(/^\+ /, "")} = 0`;
}

function cosine(multiple: number, letter: string): string {
  if (multiple === 0) return "";
  const turns = Number((2 * multiple).toPrecision(10));
  return `cos(${turns === 1 ? "" : turns}π${letter})`;
}

function signed(factor: number, cosineText: string, name: string): string {
  const size = Math.abs(factor);
  const number = size === 1 && (cosineText !== "" || name !== "") ? "" : String(size);
  return `${factor < 0 ? "−" : "+"} ${[number, cosineText, name].filter((part) => part !== "").join(" ")}`;
}

function diagramRecord({ freeDirections, axes, phases, points, boundaries }: PhaseDiagram): DiagramRecord {
  return {
    freeDirections,
    axes,
    phases,
    points: points.map(({ values, energy, phase, k }) => ({ values, energy, phase, k: k.map(waveVectorToJson) })),
    boundaries,
  };
}
