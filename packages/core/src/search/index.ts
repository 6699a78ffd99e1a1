/**
 * Which k explains the peaks? Positions (Q in Å⁻¹ of a powder, or fractional h k l of a crystal) are matched with H ± k;
 * a k is judged by its evidence, the log-odds of the peaks being its lines against their standing there by chance, with
 * a charge for what was searched and tuned. k and −k are one: kinds of k are those of the point group extended by −1
 * (docs/conventions.md, Wave vectors; docs/methods.md, From peaks to k). Sources: D. J. C. MacKay, Information Theory,
 * Inference, and Learning Algorithms (2003), chapters 27 and 28 (Laplace's method, Occam's factor); de Wolff, J. Appl.
 * Cryst. 1 (1968) 108; Smith & Snyder, J. Appl. Cryst. 12 (1979) 60.
 */
export { defaultMostBoxes } from "./certificate.js";
export { indexPeaks } from "./index-peaks.js";
export { locate } from "./locate.js";
export { checkSearchOptions, defaultSearchOptions } from "./options.js";
export { setAsidePeaks } from "./set-aside.js";
export type {
  Assignment,
  Candidate,
  Certificate,
  Correction,
  Evidence,
  EvidenceCharges,
  EvidenceReading,
  ImpurityPhase,
  IndexedLine,
  KindCertificate,
  MergedCandidate,
  NearFraction,
  NuclearState,
  Peak,
  PeakFlag,
  PeakKind,
  PeakList,
  ReferenceVector,
  Refinement,
  Region,
  ResidualStatistics,
  SearchOptions,
  SearchResult,
  Separation,
  SetAside,
  SeveralVectors,
  VectorFind,
  VectorMember,
  VectorStage,
} from "./types.js";
