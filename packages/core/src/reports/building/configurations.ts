import {
  type Configuration,
  type ConfigurationSet,
  type ConfigurationSite,
  splitPositions,
} from "../../configurations/index.js";
import { star, waveVectorToJson } from "../../kvectors/index.js";
import { formatMagneticTriplet, identifyMagneticGroup } from "../../magneticgroups/index.js";
import { formatRational, roundNumber } from "../../numbers/index.js";
import {
  type Cell,
  changeCell,
  composeBasisChanges,
  formatBasisChange,
  invertBasisChange,
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
} from "../records/configurations.js";
import { exampleScale } from "./example-moments.js";
import { modulatedRecord } from "./modulated.js";
import { cellRecord, groupRecord } from "./names.js";
import { limitOf, type NamedSite, type ParentSites } from "./parent-sites.js";
import { propertyRecords } from "./properties.js";

export function configurationsRecord(
  set: ConfigurationSet,
  cell: Cell | null,
  sites: ParentSites,
): ConfigurationsRecord {
  const { setting, change } = standardSetting(set.group);
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
    configurations: [
      ...set.configurations.map((one) => configurationRecord(set.group, one, cell, sites)),
      ...set.modulated.map((one) => modulatedRecord(one, cell, sites.magnetic)),
    ],
    bounded: [...set.bounded],
  };
}

function parentSiteRecord(site: NamedSite, magnetic: boolean): ParentSiteRecord {
  const { orbit, ion, occupancy } = site;
  return { label: orbit.label, ion, occupancy, magnetic, largestMoment: limitOf(site) };
}

function configurationRecord(
  group: SpaceGroup,
  one: Configuration,
  cell: Cell | null,
  sites: ParentSites,
): ConfigurationRecord {
  const child = cell && changeCell(cell, one.cell.cellFromParent);
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
    notWritten: one.notWritten,
    otherAtoms: sites.others.flatMap((site) => otherAtoms(group, one, site)),
    constantMoment: one.constantMoment,
    ...propertyRecords(one.consequences),
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

/** The sites with an example in μB: one generic choice of the amplitudes, scaled so that no ion exceeds what it can have. */
function siteRecords(
  { sites }: Configuration,
  child: Cell | null,
  named: readonly NamedSite[],
): readonly ConfigurationSiteRecord[] {
  if (child === null) return sites.map((site) => siteRecord(site, null));
  const scaled = exampleScale(
    child,
    named,
    sites.map(({ parentSite, exampleLattice }) => ({ parentSite, vectors: [exampleLattice] })),
  );
  return sites.map((site) => siteRecord(site, scaled(site.exampleLattice)));
}

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
