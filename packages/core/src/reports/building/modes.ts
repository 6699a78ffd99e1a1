import type { SmallIrreps } from "../../irreps/index.js";
import { parameterValues, waveVectorToJson } from "../../kvectors/index.js";
import type { IrrepModes, Mode, SiteModes } from "../../modes/index.js";
import { formatPhased, phasedToComplex } from "../../numbers/index.js";
import type { SpaceGroup } from "../../spacegroups/index.js";
import type { IrrepModesRecord, ModeRecord, ModesRecord, SiteModesRecord } from "../records/modes.js";
import { groupRecord, littleGroupRecord, positionRecord } from "./names.js";
import { complexRecord, irrepNumbers } from "./symmetry.js";

export function modesRecord(
  group: SpaceGroup,
  found: SmallIrreps,
  sites: readonly SiteModes[],
  options: { readonly axial: boolean },
): ModesRecord {
  return {
    group: groupRecord(group),
    k: waveVectorToJson(found.k),
    minusK: found.minusK,
    arms: found.arms,
    axial: options.axial,
    littleGroup: littleGroupRecord(group, found.littleGroup),
    sites: sites.map((site) => siteRecord(found, site)),
  };
}

function siteRecord(found: SmallIrreps, { orbit, suborbits, irreps }: SiteModes): SiteModesRecord {
  return {
    label: orbit.label,
    position: positionRecord(orbit.position),
    multiplicity: orbit.multiplicity,
    siteSymmetry: orbit.siteSymmetryClass,
    orbit: orbit.positions.map(positionRecord),
    suborbits: suborbits.map((atoms) => [...atoms]),
    irreps: irreps.map((part) => irrepModesRecord(found, part)),
  };
}

function irrepModesRecord(found: SmallIrreps, part: IrrepModes): IrrepModesRecord {
  const { irrep } = part;
  return {
    label: irrep.label,
    dimension: irrep.dimension,
    reality: irrep.reality,
    multiplicity: part.multiplicity,
    ...irrepNumbers(found, irrep),
    modes: part.modes.map((mode) => modeRecord(found, mode)),
    constraint: [...part.constraint],
    freeParameters: part.freeParameters,
    freeParametersWithMinusK: part.freeParametersWithMinusK,
    vanishingAtoms: [...part.vanishingAtoms],
    equalAmplitude: null,
    constantMoment: null,
  };
}

function modeRecord(found: SmallIrreps, mode: Mode): ModeRecord {
  const values = parameterValues(found.k);
  const exact = mode.moments.map(({ phase, vector }) => vector.map((factor) => ({ phase, factor })));
  // Rounding noise is judged against the largest component of the whole mode.
  const scale =
    values && Math.max(...exact.flat().map((entry) => Math.hypot(...(phasedToComplex(entry, values) ?? []))));
  return {
    copy: mode.copy,
    partner: mode.partner,
    suborbit: mode.suborbit,
    moments: values && exact.map((vector) => vector.map((entry) => complexRecord(entry, values, scale ?? 1))),
    exact: exact.map((vector) => vector.map(formatPhased)),
  };
}
