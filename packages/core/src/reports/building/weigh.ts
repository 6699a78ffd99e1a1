import type { ConfigurationSet } from "../../configurations/index.js";
import type { MagneticFormFactor, MomentSpace } from "../../diffraction/index.js";
import { waveVectorToJson } from "../../kvectors/index.js";
import { roundNumber } from "../../numbers/index.js";
import { type Cell, formatTriplet, type SpaceGroup } from "../../spacegroups/index.js";
import type { IntensityDatum, WeighedCandidate, Weighing } from "../../weighing/index.js";
import type { WeighDataRecord, WeighedRecord, WeighPatternRecord, WeighRecord } from "../records/weigh.js";
import { cellRecord, groupRecord } from "./names.js";

/** What was weighed and how, for the record. */
export interface WeighedInput {
  readonly set: ConfigurationSet;
  readonly cell: Cell;
  /** What was fitted, for which atoms an amplitude moves. */
  readonly spaces: readonly MomentSpace[];
  readonly ions: readonly { readonly label: string; readonly formFactor: MagneticFormFactor }[];
  readonly data: Omit<WeighDataRecord, "list"> & { readonly intensities: readonly IntensityDatum[] };
  readonly pattern: WeighPatternRecord | null;
}

export function weighRecord({ set, cell, spaces, ions, data, pattern }: WeighedInput, found: Weighing): WeighRecord {
  const { intensities, ...how } = data;
  const left = new Set(found.unassigned);
  const irrepsOf = (id: string) => formOf(set, id).irreps;
  return {
    group: groupRecord(set.group),
    cell: cellRecord(cell),
    k: waveVectorToJson(set.k),
    ions: ions.map(({ label, formFactor: { ion, text, largestMoment } }) => ({
      label,
      ion: ion ?? "",
      formFactor: text,
      limit: largestMoment,
    })),
    data: {
      ...how,
      list: intensities
        .filter(({ label }) => !left.has(label))
        .map(({ label, q, hkl, observed, uncertainty, holds = "satellites", polarization = null }) => ({
          label,
          q: q === null ? null : roundNumber(q),
          hkl,
          observed,
          su: roundNumber(uncertainty),
          holds,
          polarization,
        })),
    },
    ranking: found.ranking.map((one) =>
      weighedRecord(
        set,
        one,
        spaces.find(({ id }) => id === one.id),
      ),
    ),
    struckOut: found.struckOut.map(({ id, peaks, satellites }) => ({ id, irreps: irrepsOf(id), peaks, satellites })),
    pattern,
    unassigned: found.unassigned,
    relative: found.relative,
    criterion: found.criterion,
    remarks: found.remarks,
    bounded: [...set.bounded],
  };
}

function weighedRecord(set: ConfigurationSet, one: WeighedCandidate, space: MomentSpace | undefined): WeighedRecord {
  const open = one.amplitudes.flatMap(({ determined }, index) => (determined ? [] : [index]));
  // Along what the data do not see the covariance is 0: sizes that depend on it have no uncertainty.
  const depends = (atom: number) => open.some((amplitude) => movesAtom(space, amplitude, atom));
  return {
    id: one.id,
    ...formOf(set, one.id),
    chiSquared: one.chiSquared,
    reducedChiSquared: one.reducedChiSquared,
    rFactor: one.rFactor,
    parameters: one.parameters,
    criterion: one.criterion,
    amplitudes: one.amplitudes.map(({ label, value, uncertainty, determined }) => ({
      label,
      value,
      su: uncertainty,
      determined,
    })),
    freePhase: one.freePhase,
    moments: one.moments.map(({ sizeUncertainty, position, ...moment }, atom) => ({
      ...moment,
      position: position.map((entry) => roundNumber(entry)),
      sizeSu: depends(atom) ? null : sizeUncertainty,
    })),
    factorToLimit: one.factorToLimit,
    scale: one.scale,
    domains: one.domains.map(({ operator, fraction, uncertainty }) => ({
      operator: operatorText(set.group, operator),
      fraction,
      su: uncertainty,
    })),
    calculated: one.calculated,
    sameAs: one.sameAs,
    identicalTo: one.identicalTo,
    separations: one.separations.map(({ from, by, hkl, q, text }) => ({ from, by, hkl, q, text })),
    minima: one.minima.map(({ chiSquared, amplitudes }) => ({ chiSquared, amplitudes })),
    starts: one.starts,
    hits: one.hits,
  };
}

function movesAtom(space: MomentSpace | undefined, amplitude: number, atom: number): boolean {
  return (space?.basis[amplitude]?.components ?? []).some((wave) => {
    const { real = [], imaginary = [] } = wave[atom] ?? {};
    return [...real, ...imaginary].some((entry) => entry !== 0);
  });
}

function formOf(set: ConfigurationSet, id: string): { readonly irreps: string[]; readonly direction: string } {
  const found = [...set.configurations, ...set.modulated].find((one) => one.id === id);
  return { irreps: [...(found?.irreps ?? [])], direction: found?.direction ?? "" };
}

function operatorText({ operators }: SpaceGroup, index: number): string {
  const operator = operators[index];
  return operator === undefined ? "" : formatTriplet(operator);
}
