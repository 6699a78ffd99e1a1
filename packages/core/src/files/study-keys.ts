/** The keys of a study file by section; `""` is the top. A test holds the list against the manual. */
export const studyKeys = {
  "": [
    "title",
    "structure",
    "group",
    "cell",
    "sites",
    "atoms",
    "k",
    "peaks",
    "search",
    "intensities",
    "exchange",
    "onset",
    "exclude",
    "impurities",
  ],
  structure: ["file", "block"],
  cell: ["a", "b", "c", "alpha", "beta", "gamma"],
  sites: ["label", "ion", "at", "spin", "g", "form-factor", "occupancy"],
  atoms: ["label", "ion", "at", "occupancy"],
  peaks: ["file", "as", "wavelength", "tolerance", "unit", "nuclear"],
  search: ["unmatched", "max-dimension", "tolerance", "zero-shift", "cell-scale", "q-max", "weigh-intensities"],
  "form-factor": ["j0", "j2", "j2-factor"],
  intensities: [
    "file",
    "as",
    "wavelength",
    "lorentz",
    "scale",
    "resolution",
    "nuclear",
    "includes-nuclear",
    "displacement",
    "scattering-angle",
    "domains",
    "pattern-width",
  ],
  exchange: ["shell", "bond", "between", "j", "vary"],
  onset: ["file"],
  impurities: ["name", "group", "cell"],
} as const;

/** The name of a section of a study, `""` for the top. */
export type StudySectionName = keyof typeof studyKeys;

/** The sections that have the key, as a hint where it stands in the wrong one. */
export function sectionsWithKey(written: string): string[] {
  const key = written.toLowerCase().replaceAll("_", "-");
  return Object.entries(studyKeys).flatMap(([section, keys]) =>
    section !== "" && (keys as readonly string[]).includes(key) ? [section] : [],
  );
}
