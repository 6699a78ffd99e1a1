/** One option: how it is written and what it means. */
export interface OptionSpec {
  readonly flags: string;
  readonly about: string;
  /** May be given more than once, every one counts. */
  readonly repeatable?: boolean;
}

/** Every option of every command, by the name that a request or the output uses. */
export const optionSpecs = {
  k: { flags: "--k <K>", about: "wave vector: 0,1/2,0 or 0,0.472,0 or u,0,0" },
  within: { flags: "--within <DISTANCE>", about: "list special k within this distance in Å⁻¹ (0.05)" },
  from: { flags: "--from <K>", about: "wave vector whose irreps split: 0,1/2,0" },
  to: { flags: "--to <K>", about: "line or plane through it: 0,u,0" },
  full: { flags: "--full", about: "the irreps of the whole space group too, over the star" },
  structure: { flags: "--structure <FILE>", about: "CIF with cell, group and sites" },
  block: { flags: "--block <NAME>", about: "data block of the CIF, where it has several" },
  syntax: { flags: "--syntax", about: "the grammar of a CIF alone" },
  cell: { flags: "--cell <CELL>", about: '"a b c alpha beta gamma" in Å and degrees' },
  sites: { flags: "--site <SITE>", about: '"LABEL x y z", once for each site', repeatable: true },
  polar: { flags: "--polar", about: "polar vectors (displacements) instead of moments" },
  star: { flags: "--star", about: "list the basis vectors on every arm of the star" },
  exponent: { flags: "--exponent <SIGN>", about: "sign in exp(−2πi k·T): minus or plus (minus)" },
  phase: {
    flags: "--phase <WHERE>",
    about: "phases run with lattice translations or with positions: lattice or position (lattice)",
  },
  factor: { flags: "--factor <FACTOR>", about: "factor before wave + c.c.: one or half (one)" },
  components: {
    flags: "--components <AXES>",
    about: "lattice, crystal or cartesian; the last two need a cell (lattice)",
  },
  read: {
    flags: "--read <FILE>",
    about: "split the Fourier components of a list, in that convention, over the irreps",
  },
  peaks: { flags: "--peaks <FILE>", about: "list of peak positions" },
  as: { flags: "--as <KIND>", about: "what the positions are: d, q, two-theta or hkl" },
  wavelength: { flags: "--wavelength <Å>", about: "neutron wavelength" },
  tolerance: { flags: "--tolerance <T>", about: "half-width of a match, in the unit of the positions" },
  unmatched: { flags: "--unmatched <N>", about: "peaks that may stay unexplained" },
  maxDimension: { flags: "--max-dimension <0..3>", about: "kinds of k to search: points, lines, planes, all" },
  qMax: { flags: "--q-max <Q>", about: "largest Q in Å⁻¹" },
  zeroShift: { flags: "--zero-shift <MAX>", about: "largest zero shift in degrees 2θ to refine with k" },
  cellScale: { flags: "--cell-scale <MAX>", about: "largest relative change of the cell to refine with k" },
  exclude: {
    flags: "--exclude <RANGE>",
    about: '"FROM TO" in the unit of the positions: peaks there are set aside',
    repeatable: true,
  },
  impurities: {
    flags: "--impurity <PHASE>",
    about: '"NAME; GROUP; CELL": peaks on its lines are set aside',
    repeatable: true,
  },
  nuclear: {
    flags: "--nuclear <FILE>",
    about: "list of nuclear lines with intensities: for λ/2 images, in weigh for the scale",
  },
  weighIntensities: { flags: "--weigh-intensities", about: "take weak peaks as likelier strays than strong ones" },
  arms: { flags: "--arms <ARMS>", about: "arms of the star that take part: pair, all, or 1,2,… (pair)" },
  together: {
    flags: "--together <IRREPS>",
    about: "irreps at once, such as 1+3; a single one leaves out the others",
    repeatable: true,
  },
  onSites: { flags: "--on-site <SITE: IRREPS>", about: "irreps that a site may carry", repeatable: true },
  limit: { flags: "--limit <N>", about: "most elements of the group modulo the magnetic lattice (10000)" },
  parent: { flags: "--parent <STUDY>", about: "study or CIF of the nuclear structure: group, cell and magnetic sites" },
  child: { flags: "--child <CHANGE>", about: '"2a,b,c;0,0,0": axes of the file in those of the parent' },
  configuration: { flags: "--configuration <ID>", about: "which one: Γ2.1, or 2.1 for short" },
  cif: { flags: "--cif <VERSION>", about: "2.0, or 1.1, which leaves list-valued items out (2.0)" },
  fitted: { flags: "--fitted", about: "moments as fitted to the intensities of the study, not an example" },
  constants: {
    flags: "--j <CONSTANT>",
    about: '"BOND J" such as "1 1.0" or "2b -0.3", or "BOND LABEL LABEL J"; J > 0 is antiferromagnetic',
    repeatable: true,
  },
  vary: {
    flags: "--vary <RANGE>",
    about: '"BOND FROM TO COUNT": phase diagram while this constant runs; give it twice for a map',
    repeatable: true,
  },
  shells: { flags: "--shells <N>", about: "shells of neighbours to list (6, or as many as constants name)" },
  reduced: { flags: "--reduced <T>", about: "largest (T_N − T)/T_N of a fit (the widest that the law describes)" },
  intensities: { flags: "--intensities <FILE>", about: "list of integrated intensities or |F|²" },
  scale: { flags: "--scale <S>", about: "intensity per |F|² of 10⁻²⁴ cm²; without it moments are relative" },
  resolution: { flags: "--resolution <DQ>", about: "lines nearer than this in Å⁻¹ are one peak (0.01)" },
  lorentz: { flags: "--lorentz <YES>", about: "whether the Lorentz factor is in the intensities: yes or no" },
  displacement: { flags: "--displacement <B>", about: "overall displacement factor B in Å² (0)" },
  scatteringAngle: { flags: "--scattering-angle <2THETA>", about: "of the detectors, in degrees: time of flight" },
  domains: { flags: "--domains <HOW>", about: "fractions of the domains of a crystal: equal, or free to fit (equal)" },
  includesNuclear: { flags: "--includes-nuclear", about: "the intensities hold nuclear lines at the same places too" },
  pattern: {
    flags: "--pattern <WIDTH>",
    about: "simulate a pattern, lines this wide in degrees 2θ; for --csv and --svg",
  },
  formFactor: {
    flags: "--form-factor <LABEL: F>",
    about: "of a site: an ion such as Fe2+, or a constant",
    repeatable: true,
  },
  branches: { flags: "--branches <N>", about: "how many tied wave vectors are followed (3)" },
  example: { flags: "--example", about: "take the bundled example study" },
  exampleRequests: { flags: "--example", about: "take the bundled example requests" },
  json: { flags: "--json", about: "print the answer as JSON" },
  csv: { flags: "--csv", about: "print the table as CSV" },
  svg: { flags: "--svg", about: "print the drawing as SVG" },
  out: { flags: "--out <FILE>", about: "write to a new file instead of the terminal" },
  folder: { flags: "--out <DIR>", about: "write everything to a new folder" },
  force: { flags: "--force", about: "let --out replace what is there" },
  quiet: { flags: "--quiet", about: "no progress and no notes on the error output" },
} as const satisfies { readonly [name: string]: OptionSpec };

export type OptionName = keyof typeof optionSpecs;

/** `--q-max` of `--q-max <Q>`. */
export function flagOf({ flags }: OptionSpec): string {
  return flags.split(" ")[0] as string;
}

/** Whether a value belongs behind the option. */
export function takesValue({ flags }: OptionSpec): boolean {
  return flags.includes("<");
}

/** Options that shape the output of every command. */
export const outputOptions: readonly OptionName[] = ["json", "out", "force", "quiet"];
