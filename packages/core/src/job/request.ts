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
  /** Path of a CIF with cell, group and sites. */
  readonly structure?: string | null;
  /** Which data block of the CIF. */
  readonly block?: string | null;
  /** `check`: the grammar of a CIF alone. */
  readonly syntax?: boolean;
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
  /** Ranges of positions that are set aside, each `FROM TO` in the unit of the list. */
  readonly exclude?: readonly string[] | null;
  /** Other phases, each `NAME; GROUP; CELL`. */
  readonly impurities?: readonly string[] | null;
  /** Path of a list of nuclear lines measured in the same way as the peaks. */
  readonly nuclear?: string | null;
  /** Take weak peaks as likelier strays than strong ones. */
  readonly weighIntensities?: boolean;
  /** `configurations`: which arms of the star take part: pair, all or numbers from 1. */
  readonly arms?: string | null;
  /** `configurations`: irreps that are taken at once, each a set such as `Γ1+Γ3`. */
  readonly together?: readonly string[] | null;
  /** `configurations`: which irreps a site may carry, each `SITE: IRREPS`. */
  readonly onSites?: readonly string[] | null;
  /** `configurations`: the largest number of elements of an image group. */
  readonly limit?: string | null;
  /** `decompose`: path of a magnetic CIF, and its axes in those of the parent where the file does not say them. */
  readonly moments?: string | null;
  readonly child?: string | null;
  /** Only a name for messages: `decompose` takes the parent as its `study`. */
  readonly parent?: string | null;
  /** `export`: id of a configuration, and the version of the standard. */
  readonly configuration?: string | null;
  readonly cif?: string | null;
  /** `export`: take the moments from a fit to the intensities of the study. */
  readonly fitted?: boolean;
  /** `exchange`: constants, each `BOND J` or `BOND LABEL LABEL J`. */
  readonly constants?: readonly string[] | null;
  /** `exchange`: constants that run through a range, each `BOND FROM TO COUNT`. */
  readonly vary?: readonly string[] | null;
  /** `exchange`: how many shells of neighbours are listed. */
  readonly shells?: string | null;
  /** `onset`: path of a temperature scan. */
  readonly scan?: string | null;
  /** `onset`: the largest (T_N − T)/T_N of a fit. */
  readonly reduced?: string | null;
  /** `weigh`: path of a list of intensities. */
  readonly intensities?: string | null;
  /** `weigh`: intensity per |F|². */
  readonly scale?: string | null;
  /** `weigh`: Å⁻¹ within which lines are one peak. */
  readonly resolution?: string | null;
  /** `weigh`: whether the Lorentz factor is in the intensities: yes or no. */
  readonly lorentz?: string | null;
  /** `weigh`: overall B in Å². */
  readonly displacement?: string | null;
  /** `weigh`: 2θ in degrees of the detectors of a time-of-flight measurement. */
  readonly scatteringAngle?: string | null;
  /** `weigh`: fractions of the domains of a crystal: equal or free. */
  readonly domains?: string | null;
  /** `weigh`: whether the intensities hold the nuclear lines at the same places. */
  readonly includesNuclear?: boolean;
  /** `weigh`: full width at half maximum in degrees 2θ of a simulated pattern. */
  readonly pattern?: string | null;
  /** `weigh`: form factors of sites, each `LABEL: ION` or `LABEL: CONSTANT`. */
  readonly formFactors?: readonly string[] | null;
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
  structure: "--structure",
  block: "--block",
  syntax: "--syntax",
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
  exclude: "--exclude",
  impurities: "--impurity",
  nuclear: "--nuclear",
  weighIntensities: "--weigh-intensities",
  arms: "--arms",
  together: "--together",
  onSites: "--on-site",
  limit: "--limit",
  moments: "FILE",
  child: "--child",
  parent: "--parent",
  configuration: "--configuration",
  cif: "--cif",
  fitted: "--fitted",
  constants: "--j",
  vary: "--vary",
  shells: "--shells",
  scan: "FILE",
  reduced: "--reduced",
  intensities: "--intensities",
  scale: "--scale",
  resolution: "--resolution",
  lorentz: "--lorentz",
  displacement: "--displacement",
  scatteringAngle: "--scattering-angle",
  domains: "--domains",
  includesNuclear: "--includes-nuclear",
  pattern: "--pattern",
  formFactors: "--form-factor",
  branches: "--branches",
  files: "--out",
  code: "CODE",
  topic: "TOPIC",
};
