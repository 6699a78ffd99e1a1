import { type Decomposition, type GivenMoments, type MomentField, momentVerdict } from "../../configurations/index.js";
import { waveVectorToJson } from "../../kvectors/index.js";
import {
  composeMagnetic,
  formatMagneticTriplet,
  identifyMagneticGroup,
  type MagneticGroup,
  magneticGroup,
} from "../../magneticgroups/index.js";
import { identityMatrix, roundNumber } from "../../numbers/index.js";
import {
  type Cell,
  directMetric,
  formatBasisChange,
  latticeFromVectors,
  lengthInMetric,
  type SpaceGroup,
  translationOf,
} from "../../spacegroups/index.js";
import type { DecomposeRecord } from "../records/decompose.js";
import { cellRecord, groupRecord } from "./names.js";
import { limitOf, type NamedSite } from "./parent-sites.js";

/** Where the moments come from. */
export interface DecomposedFile {
  readonly file: string;
  /** Null for a list. */
  readonly block: string | null;
  /** Number of the group as the file names it. */
  readonly bns: string | null;
}

export function decomposeRecord(
  group: SpaceGroup,
  cell: Cell,
  source: DecomposedFile,
  moments: GivenMoments,
  field: MomentField,
  found: Decomposition,
  sites: readonly NamedSite[],
): DecomposeRecord {
  const { name, toBns } = identifyMagneticGroup(found.magneticGroup);
  const { recognised } = found;
  return {
    file: source.file,
    block: source.block,
    group: groupRecord(group),
    cell: cellRecord(cell),
    childFromParent: formatBasisChange(moments.childFromParent),
    furthest: roundNumber(field.furthest),
    moments: field.orbits.map((orbit, index) => momentOf(cell, field, orbit.label, index, sites)),
    parts: found.parts.map(({ k, label, share, arms }) => ({
      k: waveVectorToJson(k),
      label,
      share: roundNumber(share),
      arms: arms.map((arm) => ({
        k: waveVectorToJson(arm.k),
        sites: arm.sites.map((site) => ({
          label: site.label,
          amplitudes: site.amplitudes.map(([re, im]) => [roundNumber(re), roundNumber(im)] as const),
        })),
      })),
    })),
    magneticGroup: {
      type: found.magneticGroup.type,
      bns: { ...name.bns },
      og: { ...name.og },
      pointGroup: found.magneticGroup.pointGroup,
      toBns: formatBasisChange(toBns),
    },
    declared: { bns: source.bns, operators: identifyMagneticGroup(declaredGroup(moments)).name.bns.number },
    primary: {
      k: waveVectorToJson(found.primary.k),
      irreps: [...found.primary.irreps],
      arms: found.primary.arms.map((arm) => arm + 1),
    },
    recognised: recognised && {
      id: recognised.configuration.id,
      direction: recognised.configuration.direction,
      operator: formatMagneticTriplet(recognised.operator),
    },
    listed: (found.listed?.configurations ?? []).map(({ id }) => id),
  };
}

function momentOf(
  cell: Cell,
  { moments }: MomentField,
  site: string,
  index: number,
  sites: readonly NamedSite[],
): DecomposeRecord["moments"][number] {
  const metric = directMetric(cell);
  const sizes = (moments[index] ?? []).flat().map((moment) => lengthInMetric(metric, moment));
  const largest = Math.max(0, ...sizes);
  const named = sites.find(({ orbit }) => orbit.label === site);
  const limit = named === undefined ? null : limitOf(named);
  return {
    site,
    ion: named?.ion ?? null,
    largest: roundNumber(largest),
    limit,
    verdict: limit === null || limit === 0 || largest === 0 ? null : momentVerdict(largest, limit),
  };
}

/** The group that the operators of the file make, in the axes of the file. */
function declaredGroup({ operators, centrings }: GivenMoments): MagneticGroup {
  const pure = centrings.filter(({ timeReversal }) => timeReversal === 1);
  const lattice = latticeFromVectors([...identityMatrix, ...pure.map(({ operator }) => translationOf(operator))]);
  return magneticGroup(
    lattice,
    operators.flatMap((operator) => centrings.map((centring) => composeMagnetic(centring, operator))),
  );
}
