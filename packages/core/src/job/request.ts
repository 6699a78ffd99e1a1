import type { WorkHost } from "../algorithms/index.js";

/**
 * What is asked, as plain data: strings exactly as a user typed them. Every command takes what it needs of this and a
 * study file instead of it; an option given beside a study wins over the study.
 */
export interface Request {
  readonly command: string;
  /** Path of a study file, `-` for standard input. */
  readonly study?: string | null;
  readonly group?: string | null;
  readonly k?: string | null;
  /** `atlas`: how near in Å⁻¹ special k are listed. */
  readonly within?: string | null;
  /** `compatibility`: the k whose irreps are split, and the line or plane through it. */
  readonly from?: string | null;
  readonly to?: string | null;
  /** `irreps`: the irreps of the whole space group too. */
  readonly full?: boolean;
  readonly cell?: string | null;
  readonly sites?: readonly string[] | null;
  /** Polar vectors (displacements) instead of moments. */
  readonly polar?: boolean;
  /** `modes`: the basis vectors on every arm of the star. */
  readonly star?: boolean;
  /** `modes`: how Fourier components are written. */
  readonly exponent?: string | null;
  readonly phase?: string | null;
  readonly factor?: string | null;
  readonly components?: string | null;
  /** `modes`: path of a list of Fourier components, in that convention. */
  readonly read?: string | null;
  /** Path of a peak list. */
  readonly peaks?: string | null;
  readonly as?: string | null;
  readonly wavelength?: string | null;
  readonly tolerance?: string | null;
  readonly unmatched?: string | null;
  readonly maxDimension?: string | null;
  readonly qMax?: string | null;
  readonly zeroShift?: string | null;
  readonly cellScale?: string | null;
  /** `run`: how many tied candidates are followed. */
  readonly branches?: string | null;
  /** `run`: list the names of the files of a result folder in the result. */
  readonly files?: boolean;
  /** `explain`: a code of a problem. */
  readonly code?: string | null;
  /** `help`: what about. */
  readonly topic?: string | null;
}

/** Names of what may be asked beside the command. */
export type RequestField = Exclude<keyof Request, "command">;

/** What `answer` needs of whoever asks. */
export interface JobHost extends WorkHost {
  /**
   * The text of a file, by the path as it was given. Throws a `KvaneError` (`file-not-found`, `file-unreadable`) when
   * there is none.
   */
  readonly readText: (path: string) => Promise<string>;
}

/** How each field is called where a user gives it; problems name it in `where.argument`. */
export const argumentNames: { readonly [field in RequestField]: string } = {
  study: "STUDY",
  group: "GROUP",
  k: "--k",
  within: "--within",
  from: "--from",
  to: "--to",
  full: "--full",
  cell: "--cell",
  sites: "--site",
  polar: "--polar",
  star: "--star",
  exponent: "--exponent",
  phase: "--phase",
  factor: "--factor",
  components: "--components",
  read: "--read",
  peaks: "--peaks",
  as: "--as",
  wavelength: "--wavelength",
  tolerance: "--tolerance",
  unmatched: "--unmatched",
  maxDimension: "--max-dimension",
  qMax: "--q-max",
  zeroShift: "--zero-shift",
  cellScale: "--cell-scale",
  branches: "--branches",
  files: "--out",
  code: "CODE",
  topic: "TOPIC",
};
