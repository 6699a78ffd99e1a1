/**
 * What do the files of a study say? Text in, plain records out: the study file (YAML), CIFs and lists of peaks, with the
 * place of every value and all problems at once. Conventions: positions become Q = 2π/d in Å⁻¹ with standard uncertainties;
 * coordinates are exact as written (docs/conventions.md, Components and units; Numbers). Sources: YAML 1.2; CIF 1.1 and 2.0
 * (International Tables G; Bernstein et al., J. Appl. Cryst. 49 (2016) 277); Bragg's law for 2θ. The room reads no file itself.
 */
export type { BlockReader, CifLocation, CifRow } from "./cif/block-reader.js";
export type { CifCell } from "./cif/cell.js";
export type { FittedCell } from "./cif/cell-fit.js";
export type {
  CifBlock,
  CifDocument,
  CifItem,
  CifList,
  CifLoop,
  CifName,
  CifTable,
  CifText,
  CifValue,
  CifVersion,
} from "./cif/document.js";
export type { DraftSite, StudyDraft } from "./cif/draft-study.js";
export type { Ion } from "./cif/ions.js";
export type { MagneticSites } from "./cif/magnetic-sites.js";
export type { CifSite } from "./cif/sites.js";
export type { CifNotes, CifPart, CifStructure } from "./cif/structure.js";
export type { CifSymmetry } from "./cif/symmetry.js";
export {
  draftStudyOf,
  looksLikeCif,
  magneticSitesOf,
  parseCif,
  readCifStructure,
  readMagneticCif,
  structureBlocksOf,
} from "./cif-files.js";
export { parseFourierComponents } from "./fourier-components.js";
export { type IntensityList, type ListedIntensity, parseIntensityList } from "./intensity-list.js";
export type { MagneticAtom, MagneticStructure } from "./magnetic-cif/read.js";
export type {
  CommensurateSymmetry,
  MagneticCif,
  MagneticCifAtom,
  MagneticCifMoment,
  ModulatedSymmetry,
  MomentWave,
} from "./magnetic-cif/types.js";
export { magneticCifText } from "./magnetic-cif/write.js";
export { type ListedMoment, parseMomentList } from "./moment-list.js";
export { readPeakKind } from "./peak-kind.js";
export { type PeakListOptions, parsePeakList } from "./peak-list.js";
export type { ScanColumn, ScanRole } from "./scan-header.js";
export { isUnused, parseScanTable, type ScanTable } from "./scan-table.js";
export { parseStudy } from "./study.js";
export { type StudySectionName, studyKeys } from "./study-keys.js";
export type {
  Study,
  StudyCoupling,
  StudyFormFactor,
  StudyIntensities,
  StudyPeaks,
  StudyPlace,
  StudyRange,
  StudySearch,
  StudySite,
} from "./study-types.js";
