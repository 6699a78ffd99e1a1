import { configurationsOf } from "../../configurations/index.js";
import {
  arrangementEnergy,
  type BondTable,
  balancedModel,
  classesNamed,
  constantMoments,
  constantName,
  type DiagramAxis,
  type ExchangeLevels,
  type ExchangeModel,
  exchangeLevels,
  exchangeModel,
  type GivenCoupling,
  groundOf,
  phaseDiagram,
  type StationaryAnswer,
  stationaryConstants,
} from "../../exchange/index.js";
import { smallIrreps } from "../../irreps/index.js";
import {
  formatWaveVector,
  isExactWaveVector,
  numericWaveVector,
  type WaveVector,
  waveVectorToJson,
} from "../../kvectors/index.js";
import { siteModes } from "../../modes/index.js";
import { type ConfigurationEnergyRecord, type ExchangeRecord, exchangeRecord } from "../../reports/index.js";
import type { SiteOrbit } from "../../spacegroups/index.js";
import { cellFor, writtenCell } from "../inputs/cell-input.js";
import { bondsFor } from "../inputs/exchange-bonds.js";
import { constantsOf, rangesOf, runningAlone, spinsOf } from "../inputs/exchange-input.js";
import { groupOf } from "../inputs/group-input.js";
import { placedK, writtenKs } from "../inputs/k-input.js";
import { numberOption } from "../inputs/number-input.js";
import { orbitsOf, writtenSites } from "../inputs/site-input.js";
import { remember, together, type Work } from "../work.js";

/** k of the minimum whose eigenvectors are shown; more are told by number. */
const shownVectors = 4;

/**
 * `kvane exchange`: shells of neighbours and, with constants, the k that the model prefers. The whole job gives the k
 * that it found; without them those of the request or the study are taken.
 */
export async function exchangeCommand(work: Work, found: readonly WaveVector[] | null = null): Promise<ExchangeRecord> {
  const { group, given, sites, ks, constants, ranges, shells } = await together({
    group: () => groupOf(work),
    given: () => writtenCell(work),
    sites: () => writtenSites(work),
    ks: () => (found === null ? writtenKs(work) : []),
    constants: () => constantsOf(work),
    ranges: () => rangesOf(work),
    shells: () => numberOption(work.request, "shells", { from: 1, to: 200, whole: true }),
  });
  const { cell, placed } = await together({
    cell: () => cellFor(group, given),
    placed: () => found ?? ks.map((one) => placedK(work, group, one)),
  });
  const orbits = orbitsOf(work, group, sites, cell);
  const { table, axes } = await bondsFor(group, cell, orbits, { sites, constants, ranges, shells });
  const alone = runningAlone(ranges, table, constants);
  rememberRanges(work, table, { axes, alone, constants });
  const all = [...constants, ...alone];
  const plain = exchangeModel(table, all, all.length === 0 ? {} : spinsOf(work, sites));
  if (all.length === 0) return exchangeRecord(table, plain, nothing);
  if (ranges.length === 0 && plain.couplings.every(({ j }) => j === 0)) {
    const because = "every constant is zero: no bond acts, and every k has the same energy";
    remember(work, [{ what: "the k of least energy", value: "left out", because }], []);
    return exchangeRecord(table, plain, nothing);
  }
  const model = await balancedModel(plain, null, work.host);
  return exchangeRecord(table, model, await findingsOf(work, { model, placed, axes, orbits }));
}

const nothing = {
  ground: null,
  constantMoments: null,
  atK: [],
  configurations: [],
  stationary: null,
  diagram: null,
} as const;

/** What runs without a constant, and which bonds run apart from the rest of a shell that has one. */
function rememberRanges(
  work: Work,
  table: BondTable,
  {
    axes,
    alone,
    constants,
  }: { axes: readonly DiagramAxis[]; alone: readonly GivenCoupling[]; constants: readonly GivenCoupling[] },
): void {
  for (const one of alone) {
    const what = `J${constantName(one, classesNamed(table, one))} outside the diagram`;
    remember(work, [{ what, value: String(one.j), because: "it only runs: no constant is given for it" }], []);
  }
  for (const { name, classes } of axes)
    for (const one of constants) {
      const others = classesNamed(table, one).filter((bonds) => !classes.includes(bonds.name));
      const own = classesNamed(table, one).length - others.length;
      if (own === 0 || others.length === 0) continue;
      const value = `${classes.join(", ")} alone; ${others.map((bonds) => bonds.name).join(", ")} stays at ${one.j}`;
      const because = `J${constantName(one, classesNamed(table, one))} = ${one.j} is given for them together`;
      remember(work, [{ what: `what runs as J${name}`, value, because }], []);
    }
}

interface Question {
  readonly model: ExchangeModel;
  readonly placed: readonly WaveVector[];
  readonly axes: readonly DiagramAxis[];
  readonly orbits: readonly SiteOrbit[];
}

async function findingsOf(work: Work, { model, placed, axes, orbits }: Question) {
  const { host } = work;
  const ground = await groundOf(model, {}, host);
  const numeric = placed.filter((k) => numericWaveVector(k) !== null);
  for (const k of placed)
    if (numericWaveVector(k) === null)
      remember(
        work,
        [
          {
            what: `k = ${formatWaveVector(k)}`,
            value: "left out",
            because: "energies need a number for every letter of k",
          },
        ],
        [],
      );
  const tolerance = sameLevel * scaleOf(model);
  const shown = ground.set.vectors.slice(0, shownVectors);
  const levels = shown.map(({ k }) => ({ from: "minimum" as const, levels: exchangeLevels(model, k, tolerance) }));
  const asked = numeric.map((k) => ({ from: "given" as const, levels: exchangeLevels(model, k, tolerance) }));
  const given = numeric.filter(isExactWaveVector);
  const exact =
    given.length > 0
      ? given
      : shown
          .map(({ k }) => k)
          .filter(isExactWaveVector)
          .slice(0, 1);
  return {
    ground,
    constantMoments: constantMoments(model, ground.set.vectors, tolerance),
    atK: [...levels, ...asked],
    configurations: await energiesOfArrangements(work, model, orbits, exact),
    stationary: await stationaryFor(model, numeric, asked, work),
    diagram: axes.length === 0 ? null : await phaseDiagram(model, axes, host),
  };
}

/** Every arrangement that the irreps of these k allow, with its energy, lowest first. */
async function energiesOfArrangements(
  { host }: Work,
  model: ExchangeModel,
  orbits: readonly SiteOrbit[],
  ks: readonly WaveVector[],
): Promise<ConfigurationEnergyRecord[]> {
  const { group, cell } = model.table;
  const records: ConfigurationEnergyRecord[] = [];
  for (const k of ks) {
    const irreps = smallIrreps(group, k);
    const modes = orbits.map((orbit) => siteModes(group, irreps, orbit));
    const { configurations } = await configurationsOf(group, irreps, modes, cell, {}, host);
    for (const one of configurations) {
      const energy = arrangementEnergy(model, one);
      if (energy === null) continue;
      const { id, direction } = one;
      records.push({ id, k: waveVectorToJson(k), irreps: one.irreps, direction, ...energy });
    }
  }
  return records.sort((a, b) => a.lowest - b.lowest);
}

/** Share of Σ|J| within which eigenvalues at one computed k are one: k is known to 1e-9. */
const sameLevel = 1e-8;

function scaleOf(model: ExchangeModel): number {
  return model.couplings.reduce((sum, { j }) => sum + Math.abs(j), 0) * Math.max(...model.lengths) ** 2;
}

/** The first given k that has letters asks for constants. */
async function stationaryFor(
  model: ExchangeModel,
  ks: readonly WaveVector[],
  asked: readonly { readonly levels: ExchangeLevels }[],
  { host }: Work,
): Promise<StationaryAnswer | null> {
  const at = ks.findIndex((k) => !isExactWaveVector(k));
  const [k, levels] = [ks[at], asked[at]?.levels];
  if (!k || !levels) return null;
  return stationaryConstants(model, k, { fixedBySymmetry: isFixed(levels) }, host);
}

/** The lowest level is one irrep that no other level has: then symmetry alone makes its eigenvector. */
function isFixed({ levels }: ExchangeLevels): boolean {
  const [first, ...others] = levels;
  const own = first?.irreps ?? [];
  return (
    own.length === 1 &&
    own[0]?.multiplicity === 1 &&
    !others.some(({ irreps }) => irreps.some(({ label }) => label === own[0]?.label))
  );
}
