import type { Decomposition, GivenMoments, MomentField } from "../../configurations/index.js";
import type { MagneticStructure } from "../../files/index.js";
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
  formatBasisChange,
  latticeFromVectors,
  type SpaceGroup,
  translationOf,
} from "../../spacegroups/index.js";
import type { DecomposeRecord } from "../records/decompose.js";
import { cellRecord, groupRecord } from "./names.js";

export function decomposeRecord(
  group: SpaceGroup,
  cell: Cell,
  structure: MagneticStructure,
  moments: GivenMoments,
  field: MomentField,
  found: Decomposition,
): DecomposeRecord {
  const { name, toBns } = identifyMagneticGroup(found.magneticGroup);
  const { recognised } = found;
  return {
    file: structure.file,
    block: structure.block,
    group: groupRecord(group),
    cell: cellRecord(cell),
    childFromParent: formatBasisChange(moments.childFromParent),
    furthest: roundNumber(field.furthest),
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
    declared: { bns: structure.named.bns, operators: identifyMagneticGroup(declaredGroup(structure)).name.bns.number },
    primary: { k: waveVectorToJson(found.primary.k), irreps: [...found.primary.irreps] },
    recognised: recognised && {
      id: recognised.configuration.id,
      direction: recognised.configuration.direction,
      operator: formatMagneticTriplet(recognised.operator),
    },
    listed: (found.listed?.configurations ?? []).map(({ id }) => id),
  };
}

/** The group that the operators of the file make, in the axes of the file. */
function declaredGroup({ operators, centrings }: MagneticStructure): MagneticGroup {
  const pure = centrings.filter(({ timeReversal }) => timeReversal === 1);
  const lattice = latticeFromVectors([...identityMatrix, ...pure.map(({ operator }) => translationOf(operator))]);
  return magneticGroup(
    lattice,
    operators.flatMap((operator) => centrings.map((centring) => composeMagnetic(centring, operator))),
  );
}
