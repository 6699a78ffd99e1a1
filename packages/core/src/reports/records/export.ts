/** Result of `kvane export`: one configuration as a magnetic CIF. */
export interface ExportRecord {
  readonly configuration: string;
  readonly cifVersion: "1.1" | "2.0";
  /** The text of the file. */
  readonly cif: string;
}
