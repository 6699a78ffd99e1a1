import type { ModulatedConfiguration, ModulatedSite } from "../../configurations/index.js";
import { waveVectorToJson } from "../../kvectors/index.js";
import { formatSuperspace } from "../../magneticgroups/index.js";
import { formatRational, roundNumber } from "../../numbers/index.js";
import type { Cell } from "../../spacegroups/index.js";
import type { ModulatedRecord, ModulatedSiteRecord } from "../records/configurations.js";
import { exampleScale } from "./example-moments.js";
import type { NamedSite } from "./parent-sites.js";
import { propertyRecords } from "./properties.js";

export function modulatedRecord(
  one: ModulatedConfiguration,
  cell: Cell | null,
  named: readonly NamedSite[],
): ModulatedRecord {
  const scaled =
    cell === null
      ? null
      : exampleScale(
          cell,
          named,
          one.sites.map(({ parentSite, exampleCosine, exampleSine }) => ({
            parentSite,
            vectors: [exampleCosine, exampleSine],
          })),
        );
  return {
    id: one.id,
    irreps: [...one.irreps],
    direction: one.direction,
    arms: [...one.arms],
    index: one.index,
    domains: { ...one.domains },
    freeParameters: { ...one.freeParameters },
    freePhases: one.freePhases,
    needsSecondOrderParameter: one.needsSecondOrderParameter,
    secondaryIrreps: one.secondaryIrreps.map(({ label, k, parameters }) => ({
      label,
      k: waveVectorToJson(k),
      parameters,
    })),
    subgroupOf: [...one.subgroupOf],
    severalIrreps: one.severalIrreps,
    magneticGroup: {
      pointGroup: one.magneticGroup.pointGroup,
      superspace: {
        k: waveVectorToJson(one.superspace.k),
        operators: one.superspace.operators.map(formatSuperspace),
        centrings: one.superspace.centrings.map(formatSuperspace),
      },
    },
    sites: one.sites.map((site) => siteRecord(site, scaled)),
    ...propertyRecords(one.consequences),
  };
}

function siteRecord(
  site: ModulatedSite,
  scaled: ((vector: readonly number[]) => readonly number[]) | null,
): ModulatedSiteRecord {
  const rounded = (vector: readonly number[]) => vector.map((entry) => roundNumber(entry));
  return {
    label: site.label,
    parentSite: site.parentSite,
    multiplicity: site.multiplicity,
    positionLattice: site.position.map(formatRational),
    meanMoment: site.meanMoment,
    cosineLattice: site.cosine,
    sineLattice: site.sine,
    symmformCosine: site.symmformCosine,
    symmformSine: site.symmformSine,
    exampleCosine: rounded(site.exampleCosine),
    exampleSine: rounded(site.exampleSine),
    exampleCosineCrystal: scaled?.(site.exampleCosine) ?? null,
    exampleSineCrystal: scaled?.(site.exampleSine) ?? null,
  };
}
