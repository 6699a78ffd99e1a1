/**
 * What do the files of a study say? Text in, plain records out: the study file (YAML) and lists of peaks, with the place
 * of every value and all problems at once. Conventions: positions become Q = 2π/d in Å⁻¹ with standard uncertainties;
 * coordinates are exact as written (docs/conventions.md, Components and units; Numbers). Sources: YAML 1.2; Bragg's law
 * for 2θ. The room reads no file itself.
 */
export { parseFourierComponents } from "./fourier-components.js";
export { readPeakKind } from "./peak-kind.js";
export { type PeakListOptions, parsePeakList } from "./peak-list.js";
export { parseStudy } from "./study.js";
export { type StudySectionName, studyKeys } from "./study-keys.js";
export type { Study, StudyPeaks, StudyPlace, StudySearch, StudySite } from "./study-types.js";
