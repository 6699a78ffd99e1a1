import {
  type Configuration,
  type ConfigurationSet,
  type ConfigurationSite,
  splitPositions,
} from "../../configurations/index.js";
import { ionState } from "../../diffraction/index.js";
import { star, waveVectorToJson } from "../../kvectors/index.js";
import {
  formatMagneticTriplet,
  identifyMagneticGroup,
  type MagneticGroup,
  magneticGroup,
  type TensorForms,
  tensorForms,
} from "../../magneticgroups/index.js";
import { formatRational, roundNumber, toNumber } from "../../numbers/index.js";
import {
  type Cell,
  changeCell,
  composeBasisChanges,
  directMetric,
  formatBasisChange,
  invertBasisChange,
  lengthInMetric,
  type SpaceGroup,
  standardSetting,
} from "../../spacegroups/index.js";
import type {
  ConfigurationRecord,
  ConfigurationSiteRecord,
  ConfigurationsRecord,
  MagneticGroupRecord,
  OtherAtomRecord,
  ParentSiteRecord,
  PropertyRecord,
} from "../records/configurations.js";
import { cellRecord, groupRecord } from "./names.js";
import type { NamedSite, ParentSites } from "./parent-sites.js";

export function configurationsRecord(
  set: ConfigurationSet,
  cell: Cell | null,
  sites: ParentSites,
): ConfigurationsRecord {
  const { setting, change } = standardSetting(set.group);
  const parent = cell === null ? null : tensorForms(greyGroup(set.group), cell);
  return {
    group: groupRecord(set.group),
    cell: cell && cellRecord(cell),
    k: waveVectorToJson(set.k),
    kind: set.kind,
    arms: typeof set.arms === "string" ? set.arms : [...set.arms],
    star: star(set.group, set.k).arms.map(waveVectorToJson),
    parentStandard: { number: setting.number, change: formatBasisChange(change) },
    parentSites: [
      ...sites.magnetic.map((site) => parentSiteRecord(site, true)),
      ...sites.others.map((site) => parentSiteRecord(site, false)),
    ],
    configurations: set.configurations.map((one) => configurationRecord(set.group, one, cell, parent, sites)),
    bounded: [...set.bounded],
  };
}

function parentSiteRecord(site: NamedSite, magnetic: boolean): ParentSiteRecord {
  const { orbit, ion, occupancy } = site;
  return { label: orbit.label, ion, occupancy, magnetic, largestMoment: limitOf(site) };
}

/** μB of the free ion: 2S where the spin is given, else by Hund's rules. */
function limitOf({ ion, spin }: NamedSite): number | null {
  if (spin !== null) return 2 * toNumber(spin);
  return (ion === null ? null : ionState(ion)?.largestMoment) ?? null;
}

/** The parent with time reversal: the symmetry of the paramagnetic phase. */
function greyGroup({ lattice, operators }: SpaceGroup): MagneticGroup {
  return magneticGroup(
    lattice,
    ([1, -1] as const).flatMap((timeReversal) => operators.map((operator) => ({ operator, timeReversal }))),
  );
}

function configurationRecord(
  group: SpaceGroup,
  one: Configuration,
  cell: Cell | null,
  parent: TensorForms | null,
  sites: ParentSites,
): ConfigurationRecord {
  const child = cell && changeCell(cell, one.cell.cellFromParent);
  const forms = cell === null ? null : tensorForms(one.magneticGroup, cell);
  const property = (name: keyof TensorForms): PropertyRecord | null =>
    forms === null || parent === null ? null : propertyRecord(forms[name], parent[name]);
  return {
    id: one.id,
    irreps: [...one.irreps],
    direction: one.direction,
    arms: [...one.arms],
    index: one.index,
    domains: { ...one.domains },
    freeParameters: { ...one.freeParameters },
    freePhases: one.freePhases,
    secondaryIrreps: one.secondaryIrreps.map(({ label, k, parameters }) => ({
      label,
      k: waveVectorToJson(k),
      parameters,
    })),
    subgroupOf: [...one.subgroupOf],
    severalIrreps: one.severalIrreps,
    magneticGroup: magneticGroupRecord(one, child),
    sites: siteRecords(one, child, sites.magnetic),
    otherAtoms: sites.others.flatMap((site) => otherAtoms(group, one, site)),
    constantMoment: one.constantMoment,
    netMoment: property("netMoment"),
    polarization: property("polarization"),
    magnetoelectric: property("magnetoelectric"),
    piezomagnetic: property("piezomagnetic"),
  };
}

function magneticGroupRecord({ magneticGroup: group, cell }: Configuration, child: Cell | null): MagneticGroupRecord {
  const { name, toBns } = identifyMagneticGroup(group);
  return {
    type: group.type,
    bns: { ...name.bns },
    og: { ...name.og },
    pointGroup: group.pointGroup,
    cellFromParent: formatBasisChange(cell.cellFromParent),
    cell: child && cellRecord(child),
    // Identified in the parent's axes: back from the child to the parent first.
    toBns: formatBasisChange(composeBasisChanges(invertBasisChange(cell.cellFromParent), toBns)),
    operators: cell.operators.map(formatMagneticTriplet),
    centrings: cell.centrings.map(formatMagneticTriplet),
  };
}

/** μB. The largest moment of an example where nothing says what the ion can have. */
const unknownMoment = 1;

/** The sites with an example in μB: one generic choice of the amplitudes, scaled so that no ion exceeds what it can have. */
function siteRecords(
  { sites }: Configuration,
  child: Cell | null,
  named: readonly NamedSite[],
): readonly ConfigurationSiteRecord[] {
  if (child === null) return sites.map((site) => siteRecord(site, null));
  const metric = directMetric(child);
  const scale = sites.reduce((least, { parentSite, exampleLattice }) => {
    const size = lengthInMetric(metric, exampleLattice);
    const own = named.find(({ orbit }) => orbit.label === parentSite);
    const limit = (own && limitOf(own)) || unknownMoment;
    return size > 0 ? Math.min(least, limit / size) : least;
  }, Number.POSITIVE_INFINITY);
  const lengths = [child.a, child.b, child.c];
  return sites.map((site) =>
    siteRecord(
      site,
      site.exampleLattice.map((entry, axis) =>
        entry === 0 ? 0 : roundNumber(entry * scale * (lengths[axis] as number), 1, momentDigits),
      ),
    ),
  );
}

/** Digits of an example in μB. */
const momentDigits = 8;

function siteRecord(site: ConfigurationSite, exampleCrystal: readonly number[] | null): ConfigurationSiteRecord {
  return {
    label: site.label,
    parentSite: site.parentSite,
    multiplicity: site.multiplicity,
    positionLattice: site.positionLattice.map(formatRational),
    momentLattice: site.momentLattice,
    symmformLattice: site.symmformLattice,
    symmformCrystal: site.symmformCrystal,
    exampleLattice: site.exampleLattice.map((entry) => roundNumber(entry)),
    exampleCrystal,
  };
}

function otherAtoms(group: SpaceGroup, one: Configuration, { orbit }: NamedSite): OtherAtomRecord[] {
  const parts = splitPositions(group, one.cell, orbit);
  return parts.map(({ position, multiplicity }, index) => ({
    label: parts.length === 1 ? orbit.label : `${orbit.label}_${index + 1}`,
    parentSite: orbit.label,
    multiplicity,
    positionLattice: position.map(formatRational),
  }));
}

/** Letters beyond those of the parent's form are what the order adds. */
function propertyRecord(form: readonly string[], parent: readonly string[]): PropertyRecord {
  const letters = (entries: readonly string[]) =>
    new Set(entries.flatMap((entry) => entry.match(/[A-ZΛα][a-z0-9]*/gu) ?? []));
  const [own, before] = [letters(form), letters(parent)];
  return { form: [...form], inParent: before.size > 0, induced: own.size > before.size };
}
