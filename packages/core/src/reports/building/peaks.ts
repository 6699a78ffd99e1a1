import { reducedRepresentative, type WaveVector, waveVectorToJson } from "../../kvectors/index.js";
import { formatRational, roundNumber } from "../../numbers/index.js";
import type { Overlap, SatelliteReflection } from "../../reflections/index.js";
import type {
  Candidate,
  Certificate,
  IndexedLine,
  PeakFlag,
  PeakList,
  ReferenceVector,
  Region,
  SetAside,
  SeveralVectors,
} from "../../search/index.js";
import type { Cell, SpaceGroup } from "../../spacegroups/index.js";
import type { OverlapRecord, SatelliteRecord, SatellitesRecord } from "../records/satellites.js";
import type {
  AssignmentRecord,
  CandidateRecord,
  CertificateRecord,
  EvidenceRecord,
  LineRecord,
  PeaksRecord,
  ReferenceRecord,
  SearchRecord,
  SeveralVectorsRecord,
} from "../records/search.js";
import { cellRecord, groupRecord } from "./names.js";

/** The record of a list of satellites for JSON, text and CSV. */
export function satellitesRecord(
  group: SpaceGroup,
  cell: Cell,
  k: WaveVector,
  found: {
    readonly wavelengthAngstrom: number | null;
    readonly qMax: number;
    readonly overlapWithin: number;
    readonly reflections: readonly SatelliteReflection[];
    /** For each line the labels of the irreps that make it zero. */
    readonly extinct: readonly (readonly string[])[] | null;
  },
): SatellitesRecord {
  return {
    group: groupRecord(group),
    cell: cellRecord(cell),
    k: waveVectorToJson(k),
    wavelengthAngstrom: found.wavelengthAngstrom,
    qMax: roundNumber(found.qMax),
    overlapWithin: roundNumber(found.overlapWithin),
    reflections: found.reflections.map((line, index) => satelliteRecord(line, found.extinct?.[index] ?? null)),
  };
}

function satelliteRecord(line: SatelliteReflection, extinctFor: readonly string[] | null): SatelliteRecord {
  return {
    h: line.h.map((entry) => roundNumber(entry)),
    sign: line.sign,
    arm: line.arm,
    q: roundNumber(line.q),
    d: roundNumber(line.d),
    twoThetaDeg: rounded(line.twoThetaDeg),
    multiplicity: line.multiplicity,
    multiplicityAllArms: line.multiplicityAllArms,
    overlaps: line.overlaps.map(overlapRecord),
    moreOverlaps: line.moreOverlaps,
    extinctFor,
    intensity: null,
  };
}

/** What lies on a position, for JSON. */
export function overlapRecord(one: Overlap): OverlapRecord {
  return {
    with: one.with,
    h: one.h.map((entry) => roundNumber(entry)),
    q: roundNumber(one.q),
    separation: roundNumber(one.separation),
    allowed: one.allowed,
  };
}

/** The peak list as it was read; `file` as the user named it. */
export function peaksRecord(peaks: PeakList, file: string | null): PeaksRecord {
  return {
    file,
    kind: peaks.kind,
    wavelengthAngstrom: peaks.wavelengthAngstrom,
    uncertaintySource: peaks.uncertaintySource,
    list: peaks.peaks.map((peak) => ({
      index: peak.index,
      position: rounded(peak.position),
      hkl: roundedAll(peak.hkl),
      q: rounded(peak.q),
      uncertainty: roundNumber(peak.uncertainty ?? peak.hklUncertainty ?? 0),
      intensity: rounded(peak.intensity),
    })),
  };
}

/** The record of a search for k for JSON, text and CSV. */
export function searchRecord(
  group: SpaceGroup,
  cell: Cell,
  peaks: PeaksRecord,
  found: {
    readonly candidates: readonly Candidate[];
    readonly certificate: Certificate | null;
    readonly setAside: readonly SetAside[];
    readonly unmatched: readonly number[];
    readonly regions?: readonly Region[];
    readonly references?: readonly ReferenceVector[];
    readonly flags?: readonly PeakFlag[];
    readonly severalVectors?: SeveralVectors | null;
    readonly dropped: number;
  },
): SearchRecord {
  return {
    group: groupRecord(group),
    cell: cellRecord(cell),
    peaks,
    candidates: found.candidates.map((candidate) => candidateRecord(group, candidate)),
    certificate: found.certificate && certificateRecord(found.certificate),
    setAside: found.setAside.map(({ peak, because }) => ({ peak, because })),
    unmatched: [...found.unmatched],
    regions: (found.regions ?? []).map((region) => ({
      kind: waveVectorToJson(region.kind),
      from: region.from.map((entry) => roundNumber(entry)),
      to: region.to.map((entry) => roundNumber(entry)),
      leaves: region.leaves,
      decided: region.decided,
    })),
    flags: (found.flags ?? []).map((flag) => ({
      peak: flag.peak,
      with: flag.with,
      h: [...flag.h],
      state: flag.state,
      separation: roundNumber(flag.separation),
      parentIntensity: rounded(flag.parentIntensity),
    })),
    references: (found.references ?? []).map(referenceRecord),
    severalVectors: severalVectorsRecord(found.severalVectors ?? null),
    dropped: found.dropped,
  };
}

function referenceRecord({ k, evidence, matched, total }: ReferenceVector): ReferenceRecord {
  return { k: waveVectorToJson(k), evidence: roundNumber(evidence.value), matched, total };
}

function severalVectorsRecord(several: SeveralVectors | null): SeveralVectorsRecord | null {
  return (
    several && {
      stages: several.stages.map((one) => ({ ...one, minimumMatched: [...one.minimumMatched] })),
      found: several.found.map((find) => ({
        stage: find.stage,
        vectors: find.vectors.map(waveVectorToJson),
        members: find.members.map(({ name, k, peaks }) => ({ name, k: waveVectorToJson(k), peaks: [...peaks] })),
        evidence: evidenceRecord(find.evidence),
        gain: roundNumber(find.gain),
        matched: find.matched,
        total: find.total,
        unmatched: [...find.unmatched],
      })),
      single: referenceRecord(several.single),
    }
  );
}

function evidenceRecord({ value, reading, charges }: Candidate["evidence"]): EvidenceRecord {
  return {
    value: roundNumber(value),
    reading,
    charges: {
      dimensions: roundNumber(charges.dimensions),
      kinds: roundNumber(charges.kinds),
      tuning: roundNumber(charges.tuning),
    },
  };
}

function candidateRecord(group: SpaceGroup, candidate: Candidate): CandidateRecord {
  const { evidence, residuals, refinement } = candidate;
  return {
    k: waveVectorToJson(candidate.k),
    reduced: waveVectorToJson(reducedRepresentative(group, candidate.k)),
    manifold: waveVectorToJson(candidate.manifold.form),
    dimension: candidate.manifold.dimension,
    arms: candidate.arms,
    onNuclearLines: candidate.onNuclearLines,
    evidence: evidenceRecord(evidence),
    matched: candidate.matched,
    total: candidate.total,
    deWolff: rounded(candidate.deWolff),
    smithSnyder: rounded(candidate.smithSnyder),
    nearFractions: candidate.nearFractions.map(({ parameter, fraction, deviation }) => ({
      letter: parameter,
      fraction: formatRational(fraction),
      deviation: roundNumber(deviation),
    })),
    tiedWith: [...candidate.tiedWith],
    assignments: candidate.assignments.map(
      (one): AssignmentRecord => ({
        peak: one.peak,
        ...lineRecord(one),
        q: roundNumber(one.q),
        residualHkl: roundedAll(one.residualHkl),
        alternatives: one.alternatives.map(lineRecord),
      }),
    ),
    unmatched: [...candidate.unmatched],
    residuals: {
      rootMeanSquare: roundNumber(residuals.rootMeanSquare),
      largest: roundNumber(residuals.largest),
      chiSquared: roundNumber(residuals.chiSquared),
      degreesOfFreedom: residuals.degreesOfFreedom,
      reducedChiSquared: rounded(residuals.reducedChiSquared),
    },
    refinement: refinement && {
      from: waveVectorToJson(refinement.from),
      determined: refinement.determined,
      converged: refinement.converged,
      rescaledSu: roundedAll(refinement.rescaledUncertainties),
    },
    corrections: candidate.corrections.map(({ name, value, uncertainty, limit }) => ({
      name,
      value: roundNumber(value),
      su: rounded(uncertainty),
      limit: roundNumber(limit),
    })),
    region: candidate.region,
    merged: candidate.merged.map((one) => ({
      k: waveVectorToJson(one.k),
      dimension: one.dimension,
      evidence: roundNumber(one.evidence.value),
      matched: one.matched,
    })),
    separations: candidate.separations.map((one) => ({
      candidate: one.candidate,
      k: waveVectorToJson(one.k),
      q: roundNumber(one.q),
      distance: roundNumber(one.distance),
      resolution: rounded(one.resolution),
      toldApart: one.toldApart,
    })),
  };
}

function certificateRecord(certificate: Certificate): CertificateRecord {
  return {
    ...certificate,
    smallestBox: roundNumber(certificate.smallestBox),
    kinds: certificate.kinds.map((one) => ({
      ...one,
      kind: waveVectorToJson(one.kind),
      unexplored: roundNumber(one.unexplored),
    })),
  };
}

function lineRecord(line: IndexedLine): LineRecord {
  return {
    h: line.h.map((entry) => roundNumber(entry)),
    sign: line.sign,
    arm: line.arm,
    residual: roundNumber(line.residual),
  };
}

function rounded(value: number | null): number | null {
  return value === null ? null : roundNumber(value);
}

function roundedAll(values: readonly number[] | null): number[] | null {
  return values === null ? null : values.map((value) => roundNumber(value));
}
