import { roundNumber } from "../../numbers/index.js";
import type { SiteOrbit } from "../../spacegroups/index.js";
import type { CheckedSiteRecord } from "../records/check.js";
import { positionRecord } from "./names.js";

/** A site of a study after its orbit was made. */
export function checkedSiteRecord(orbit: SiteOrbit, ion: string | null): CheckedSiteRecord {
  const { snapped } = orbit;
  return {
    label: orbit.label,
    ion,
    position: positionRecord(orbit.position),
    multiplicity: orbit.multiplicity,
    siteSymmetry: orbit.siteSymmetryClass,
    freeCoordinates: [...orbit.freeCoordinates],
    allowedMoment: [...orbit.allowedMoment],
    snapped: snapped && {
      from: positionRecord(snapped.from),
      distanceAngstrom: snapped.distanceAngstrom === null ? null : roundNumber(snapped.distanceAngstrom),
    },
  };
}
