import { breathe, type WorkHost } from "../algorithms/index.js";
import type { SmallIrreps } from "../irreps/index.js";
import type { SiteModes } from "../modes/index.js";
import { type Cyclotomic, cyclotomicToComplex } from "../numbers/index.js";
import type { Cell, SpaceGroup } from "../spacegroups/index.js";
import { type ArmChoice, armSets, selectArms } from "./arm-selection.js";
import { cellMetric } from "./cell-metric.js";
import { childCell } from "./child-cell.js";
import { consequencesIn } from "./consequences.js";
import { directionText, pairsTaken } from "./direction-text.js";
import { type ConstantMoment, constantMoment } from "./equal-sizes.js";
import { type FixedVectors, fixedVectors } from "./fixed-vectors.js";
import { fixedDimensions, type HarmonicShelf, harmonicShelf, periodicRows } from "./harmonics.js";
import { type IsotropyClass, isotropyClasses } from "./isotropy.js";
import { momentRows } from "./moment-fields.js";
import { type OrderParameter, orderParameters } from "./order-parameter.js";
import { type ParentQuotient, parentQuotient } from "./parent-quotient.js";
import { type GraphEntry, minimalSupergroups } from "./relations.js";
import { fieldFor, type ResidueAction, residueAction } from "./residue-action.js";
import { type CopyOnArms, copiesOnArms, type SiteFrame, siteFrame } from "./site-frames.js";
import { asCyclotomic, momentAxes, type SplitOrbit, splitOrbits } from "./split-orbits.js";
import { configurationSites, type SiteShare } from "./split-sites.js";
import { domainsOf, groupOfStabilizer, type Stabilizer, stabilizerOf } from "./stabilizer.js";
import type { Configuration, SecondaryIrrep } from "./types.js";

/** What a list of configurations starts from. */
export interface CommensurateRequest {
  readonly group: SpaceGroup;
  readonly irreps: SmallIrreps;
  readonly sites: readonly SiteModes[];
  readonly cell: Cell | null;
  readonly arms: ArmChoice;
  /** Labels set by set, or null for every irrep by itself. */
  readonly together: readonly (readonly string[])[] | null;
  /** Irreps by label that each site may carry; sites not named carry all. */
  readonly onSites: Readonly<Record<string, readonly string[]>>;
  readonly limit: number;
}

/** The directions of every set of order parameters, plainest first within a set. */
async function candidatesOf(
  request: CommensurateRequest,
  quotient: ParentQuotient,
  sets: readonly (readonly ResidueAction[])[],
  host: WorkHost,
): Promise<{ candidates: Candidate[]; bounded: string[] }> {
  const bounded: string[] = [];
  const candidates: Candidate[] = [];
  for (const set of sets) {
    if (set.length === 0) continue;
    const list = await isotropyClasses(quotient, set, request.limit, host);
    if (list.bounded !== null)
      bounded.push(`${set.map(({ parameter }) => parameter.labels.join("+")).join(", ")}: ${list.bounded}`);
    const own: Candidate[] = [];
    for (const found of list.classes) {
      await breathe(host);
      const candidate = candidateOf(quotient, set, found);
      if (Array.isArray(request.arms) && candidate.pairs.length < quotient.selection.pairs.length) continue;
      if (candidate.parts.some((part) => part.real.length === 0)) continue;
      own.push(candidate);
    }
    candidates.push(...own.sort(plainestFirst));
  }
  return { candidates, bounded };
}

interface Candidate extends GraphEntry {
  readonly parts: readonly FixedVectors[];
  readonly pairs: readonly number[];
  readonly direction: string;
}

/** All directions of the order parameters with their magnetic groups, for a k whose components are all fractions. */
export async function commensurateConfigurations(
  request: CommensurateRequest,
  host: WorkHost,
): Promise<{ configurations: Configuration[]; bounded: string[] }> {
  const { group, irreps } = request;
  const selection = selectArms(group, irreps.k, request.arms);
  const quotient = parentQuotient(group, selection);
  const frames = request.sites.map((site) => siteFrame(group, site));
  const carried = (label: string): boolean =>
    frames.some((frame) => allowedOn(request, frame, [label]) && multiplicityOf(frame, label) > 0);
  const named = request.together === null ? null : new Set(request.together.flat());
  const parameters = orderParameters(
    group,
    irreps,
    selection,
    (label) => carried(label) && (named === null || named.has(label)),
  );
  if (parameters.length === 0) return { configurations: [], bounded: [] };
  const actions = actionsOf(quotient, parameters);
  const sets =
    request.together === null
      ? actions.map((action) => [action])
      : request.together.map((labels) =>
          actions.filter(({ parameter }) => parameter.labels.some((label) => labels.includes(label))),
        );
  const { candidates, bounded } = await candidatesOf(request, quotient, sets, host);
  const graph = await minimalSupergroups(quotient, candidates, host);
  const shelf = harmonicShelf(group, irreps, frames);
  const ids = identifiers(candidates);
  const copies = copiesFor(request, quotient, frames);
  const properties = request.cell === null ? null : consequencesIn(group, request.cell);
  const configurations: Configuration[] = [];
  for (const [index, candidate] of candidates.entries()) {
    await breathe(host);
    host.progress?.(index, candidates.length, "magnetic groups");
    const made = configurationOf(request, quotient, frames, copies, shelf, candidate);
    configurations.push({
      ...made,
      consequences: properties === null ? null : properties(made.magneticGroup),
      id: ids[index] as string,
      subgroupOf: (graph[index] as number[]).map((other) => ids[other] as string),
    });
  }
  const short = configurations.filter(({ notWritten }) => notWritten !== null);
  if (short.length > 0)
    bounded.push(
      `the moments of ${short.length} configurations (${short[0]?.id}: ${short[0]?.notWritten}) are not written out; a higher limit does it`,
    );
  return { configurations, bounded };
}

function multiplicityOf(frame: SiteFrame, label: string): number {
  return frame.modes.irreps.find(({ irrep }) => irrep.label === label)?.multiplicity ?? 0;
}

function allowedOn(request: CommensurateRequest, frame: SiteFrame, labels: readonly string[]): boolean {
  const own = request.onSites[frame.orbit.label];
  return own === undefined || labels.some((label) => own.includes(label));
}

/** One prime serves all order parameters; a later one is taken where a real basis is singular modulo it. */
function actionsOf(quotient: ParentQuotient, parameters: readonly OrderParameter[]): ResidueAction[] {
  for (let skip = 0; ; skip++) {
    const field = fieldFor(quotient, parameters, skip);
    const actions = parameters.map((parameter) => residueAction(quotient, parameter, field));
    if (actions.every((action) => action !== null)) return actions as ResidueAction[];
  }
}

function candidateOf(quotient: ParentQuotient, actions: readonly ResidueAction[], found: IsotropyClass): Candidate {
  const parts = actions.map((action) => fixedVectors(quotient, action, found.elements));
  return { actions, found, parts, pairs: pairsTaken(parts), direction: directionText(parts) };
}

/** Fewest free directions first, then fewest arms, then the larger groups, then the text. */
function plainestFirst(a: Candidate, b: Candidate): number {
  return (
    a.pairs.length - b.pairs.length ||
    a.found.space.rows - b.found.space.rows ||
    b.found.elements.length - a.found.elements.length ||
    comparePivots(a, b) ||
    (a.direction < b.direction ? -1 : 1)
  );
}

function comparePivots(a: Candidate, b: Candidate): number {
  const [left, right] = [a, b].map(({ parts }) => parts.flatMap(({ pivots }) => pivots)) as [number[], number[]];
  const at = left.findIndex((pivot, index) => pivot !== right[index]);
  return at < 0 ? 0 : (left[at] as number) - (right[at] as number);
}

function identifiers(candidates: readonly Candidate[]): string[] {
  const counts = new Map<string, number>();
  return candidates.map(({ actions }) => {
    const name = actions.map(({ parameter }) => parameter.irrep.label).join("+");
    const number = (counts.get(name) ?? 0) + 1;
    counts.set(name, number);
    return `${name}.${number}`;
  });
}

type Copies = (frame: SiteFrame, label: string) => readonly CopyOnArms[];

function copiesFor(request: CommensurateRequest, quotient: ParentQuotient, frames: readonly SiteFrame[]): Copies {
  const made = frames.map(() => new Map<string, readonly CopyOnArms[]>());
  return (frame, label) => {
    const shelf = made[frames.indexOf(frame)] as Map<string, readonly CopyOnArms[]>;
    const known = shelf.get(label) ?? copiesOnArms(request.group, quotient.selection, frame, label);
    shelf.set(label, known);
    return known;
  };
}

function configurationOf(
  request: CommensurateRequest,
  quotient: ParentQuotient,
  frames: readonly SiteFrame[],
  copies: Copies,
  shelf: HarmonicShelf,
  candidate: Candidate,
): Omit<Configuration, "id" | "subgroupOf" | "consequences"> {
  const { group, cell } = request;
  const { selection } = quotient;
  const stabilizer = stabilizerOf(quotient, candidate.found.elements);
  const magneticGroup = groupOfStabilizer(stabilizer);
  const child = childCell(magneticGroup);
  const axes = momentAxes(group.operators, group.primitive.rotations, child.cellFromParent.matrix, child.inverse);
  const inverse = asCyclotomic(child.inverse);
  const split = frames.map((frame) => splitOrbits(stabilizer, frame, axes));
  const irrepParameters = frames.reduce((sum, frame) => sum + parametersOn(request, frame, candidate.parts), 0);
  const atoms = split.reduce((sum, orbits) => sum + orbits.length, 0);
  const written = atoms * irrepParameters <= formsPerLimit * request.limit;
  const shares = frames.map((frame, index): SiteShare => {
    const orbits = split[index] as readonly SplitOrbit[];
    if (!written) return { frame, orbits, moments: { rows: [] } };
    const sources = candidate.parts
      .filter(({ parameter }) => allowedOn(request, frame, parameter.labels))
      .map((fixed) => ({ fixed, copies: copies(frame, fixed.parameter.irrep.label) }));
    return { frame, orbits, moments: momentRows(quotient, orbits, sources, inverse) };
  });
  const metric = cellMetric(group, cell, child.cellFromParent.matrix);
  if (written && shares.reduce((sum, { moments }) => sum + moments.rows.length, 0) !== irrepParameters)
    throw new Error("the fields of an irrep are not as many as its copies and directions ask for");
  return {
    irreps: candidate.parts.flatMap(({ parameter }) => parameter.labels),
    direction: candidate.direction,
    arms: candidate.pairs.map((pair) => selection.members[selection.pairs[pair]?.[0] as number] as number),
    ...domainsOf(
      stabilizer,
      armSets(
        group,
        selection,
        candidate.pairs.flatMap((pair) => selection.pairs[pair] ?? []),
      ),
    ),
    freeParameters: {
      irreps: irrepParameters,
      group: shares.reduce(
        (sum, { orbits }) => sum + orbits.reduce((own: number, { allowed }) => own + allowed.length, 0),
        0,
      ),
    },
    freePhases: 0,
    secondaryIrreps: secondaryIrreps(request, candidate, stabilizer, shelf, irrepParameters),
    severalIrreps: candidate.parts.length > 1,
    magneticGroup,
    cell: { cellFromParent: child.cellFromParent, operators: child.operators, centrings: child.centrings },
    sites: written ? configurationSites(group, child, shares, metric) : [],
    notWritten: written ? null : `${atoms} atoms with ${irrepParameters} amplitudes`,
    constantMoment: metric.metric === null || !written ? null : allConstant(shares, metric.metric),
  };
}

/** Atoms × amplitudes that are written out, as a multiple of the limit on elements. */
const formsPerLimit = 3;

/**
 * Real amplitudes of a site: as many as real directions for every copy; two copies make one for pseudoreal irreps, whose
 * order parameter is the irrep taken twice.
 */
function parametersOn(request: CommensurateRequest, frame: SiteFrame, parts: readonly FixedVectors[]): number {
  return parts.reduce((sum, { parameter, real }) => {
    if (!allowedOn(request, frame, parameter.labels)) return sum;
    const copies = multiplicityOf(frame, parameter.irrep.label);
    return sum + (copies * real.length) / (parameter.irrep.reality === "pseudoreal" ? 2 : 1);
  }, 0);
}

/** Other irreps, of this or other k, whose fields the magnetic group leaves unchanged, with the parameters they add. */
function secondaryIrreps(
  request: CommensurateRequest,
  candidate: Candidate,
  stabilizer: Stabilizer,
  shelf: HarmonicShelf,
  primary: number,
): SecondaryIrrep[] {
  const { rows, denominator } = periodicRows(stabilizer);
  const harmonics = [...new Set(rows.map((row) => shelf.at(row, denominator)))];
  const listed = new Set(candidate.parts.flatMap(({ parameter }) => parameter.labels));
  const found: SecondaryIrrep[] = [];
  let rest = -primary;
  for (const harmonic of harmonics) {
    const sameK = harmonic.irreps === request.irreps;
    const dimensions = fixedDimensions(harmonic, stabilizer);
    harmonic.irreps.irreps.forEach(({ label }, index) => {
      const parameters = harmonic.weight * (dimensions[index] as number) * (harmonic.multiplicities[index] as number);
      if (parameters === 0) return;
      if (sameK && listed.has(label)) rest += parameters;
      else found.push({ label, k: harmonic.irreps.k, sameK, parameters });
    });
  }
  // The listed irreps on other arms, where k is a harmonic of itself.
  const [label] = listed;
  if (rest > 0 && label !== undefined) found.push({ label, k: request.irreps.k, sameK: true, parameters: rest });
  return found;
}

function allConstant(shares: readonly SiteShare[], metric: readonly number[]): ConstantMoment {
  const verdicts = shares
    .filter(({ moments }) => moments.rows.length > 0)
    .map(({ moments, orbits }) =>
      constantMoment(
        moments.rows.map((row) =>
          orbits.map((_, number) => [0, 1, 2].map((axis) => floatOf(row.get(3 * number + axis)))),
        ),
        metric,
      ),
    );
  if (verdicts.includes("impossible")) return "impossible";
  return verdicts.includes("possible") ? "possible" : "always";
}

function floatOf(value: Cyclotomic | undefined): number {
  return value === undefined ? 0 : cyclotomicToComplex(value)[0];
}
