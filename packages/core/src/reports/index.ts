/**
 * How is a result said? Result records in the shapes of the JSON contract, their JSON Schemas, JSON text, the text
 * reports of at most 100 columns, CSV tables and the files of a result folder. Text and tables are made from the
 * records alone, so that nothing is printed that the JSON does not hold. Exact numbers are texts, measured ones numbers
 * that went through the one formatter, complex ones `[re, im]`. Conventions: docs/conventions.md.
 */
export { atlasRecord, type PlacedK } from "./building/atlas.js";
export { checkedSiteRecord } from "./building/check.js";
export { compatibilityRecord } from "./building/compatibility.js";
export { type ExchangeFindings, exchangeRecord } from "./building/exchange.js";
export { modesRecord } from "./building/modes.js";
export { cellRecord, groupRecord, littleGroupRecord } from "./building/names.js";
export { onsetRecord } from "./building/onset.js";
export type { NamedSite, ParentSites } from "./building/parent-sites.js";
export { overlapRecord, peaksRecord, satellitesRecord, searchRecord } from "./building/peaks.js";
export { irrepsRecord, opsRecord, starRecord } from "./building/symmetry.js";
export type { WeighedInput } from "./building/weigh.js";
export { cifCode } from "./cif-code.js";
export { jsonText } from "./json-text.js";
export { configurationCif, configurationsRecord, decomposeRecord, weighRecord } from "./made-records.js";
export { physicalSets } from "./physical-sets.js";
export type { AtlasRecord, KindRecord, NearbyKindRecord, PlacedKRecord } from "./records/atlas.js";
export type { CheckedSiteRecord, CheckRecord, CifBlockRecord, CifRecord } from "./records/check.js";
export type {
  AssumedRecord,
  CellRecord,
  ComplexRecord,
  Envelope,
  GroupRecord,
  InputRecord,
  KRecord,
  LittleGroupRecord,
} from "./records/common.js";
export type { CompatibilityRecord, NamedIrrepRecord, PartRecord } from "./records/compatibility.js";
export {
  type AnyConfiguration,
  type ConfigurationRecord,
  type ConfigurationSiteRecord,
  type ConfigurationsRecord,
  commensurateOnes,
  type MagneticGroupRecord,
  type ModulatedRecord,
  type ModulatedSiteRecord,
  modulatedOnes,
  type OtherAtomRecord,
  type ParentSiteRecord,
  type PropertyRecord,
  type SecondaryIrrepRecord,
} from "./records/configurations.js";
export type { DecomposeRecord, IrrepPartRecord } from "./records/decompose.js";
export type {
  BondClassRecord,
  ConfigurationEnergyRecord,
  DiagramRecord,
  ExchangeAtKRecord,
  ExchangeAtomRecord,
  ExchangeCertificateRecord,
  ExchangeLevelRecord,
  ExchangeRecord,
  GroundRecord,
  IrrepCountRecord,
  ShellRecord,
  StationaryRecord,
} from "./records/exchange.js";
export type { ExportRecord } from "./records/export.js";
export type {
  ExactIrrepRecord,
  FullIrrepsRecord,
  IrrepRecord,
  IrrepsRecord,
  MinusKRelationRecord,
} from "./records/irreps.js";
export type {
  ArmModesRecord,
  ConventionRecord,
  IrrepModesRecord,
  MinusKModesRecord,
  ModeRecord,
  ModesRecord,
  ReadComponentsRecord,
  SiteModesRecord,
} from "./records/modes.js";
export type {
  MeasuredRecord,
  MovingKRecord,
  OnsetRecord,
  PeakOnsetRecord,
  PowerLawRecord,
  TransitionRecord,
} from "./records/onset.js";
export type { OpsRecord } from "./records/ops.js";
export type { BranchRecord, RunRecord } from "./records/run.js";
export type { OverlapRecord, SatelliteRecord, SatellitesRecord } from "./records/satellites.js";
export type {
  AssignmentRecord,
  CandidateRecord,
  CertificateRecord,
  EvidenceRecord,
  LineRecord,
  NearFractionRecord,
  PeakRecord,
  PeaksRecord,
  RefinementRecord,
  ResidualsRecord,
  SearchRecord,
} from "./records/search.js";
export type { ExplainRecord, HelpRecord } from "./records/simple.js";
export type { StarRecord } from "./records/star.js";
export type { StudyRecord } from "./records/study.js";
export type {
  WeighDataRecord,
  WeighedRecord,
  WeighIonRecord,
  WeighMomentRecord,
  WeighPatternRecord,
  WeighRecord,
} from "./records/weigh.js";
export {
  type ReportForm,
  reportCsv,
  reportEndings,
  reportForm,
  reportIn,
  reportSvg,
  resultFolder,
} from "./report-files.js";
export { resultFileNames } from "./result-file-names.js";
export type { ResultFile } from "./result-folder.js";
export type { JsonSchema } from "./schemas/building.js";
export { answerSchema, describedCommands } from "./schemas/envelope.js";
export { reportText } from "./text/report-text.js";
