import type {
  AtlasRecord,
  CheckRecord,
  CompatibilityRecord,
  ConfigurationsRecord,
  DecomposeRecord,
  ExchangeRecord,
  ExplainRecord,
  ExportRecord,
  HelpRecord,
  IrrepsRecord,
  ModesRecord,
  OnsetRecord,
  OpsRecord,
  RunRecord,
  SatellitesRecord,
  SearchRecord,
  StarRecord,
  StudyRecord,
  WeighRecord,
} from "../reports/index.js";

/** The result of each command, by its name: what `answer` gives for a command that is known when a program is compiled. */
export interface CommandResults {
  readonly run: RunRecord;
  readonly study: StudyRecord;
  readonly report: RunRecord;
  readonly check: CheckRecord;
  readonly ops: OpsRecord;
  readonly atlas: AtlasRecord;
  readonly star: StarRecord;
  readonly irreps: IrrepsRecord;
  readonly compatibility: CompatibilityRecord;
  readonly modes: ModesRecord;
  readonly configurations: ConfigurationsRecord;
  readonly decompose: DecomposeRecord;
  readonly export: ExportRecord;
  readonly satellites: SatellitesRecord;
  readonly index: SearchRecord;
  readonly locate: SearchRecord;
  readonly weigh: WeighRecord;
  readonly exchange: ExchangeRecord;
  readonly onset: OnsetRecord;
  readonly explain: ExplainRecord;
  readonly help: HelpRecord;
}
