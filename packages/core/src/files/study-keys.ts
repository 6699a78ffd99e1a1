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
  sites: ["label", "ion", "at", "spin", "occupancy"],
  atoms: ["label", "ion", "at", "occupancy"],
  peaks: ["file", "as", "wavelength", "tolerance", "unit", "nuclear"],
  search: ["unmatched", "max-dimension", "tolerance", "zero-shift", "cell-scale", "q-max", "weigh-intensities"],
  intensities: ["file", "as", "wavelength", "lorentz", "scale", "resolution"],
  exchange: ["shell", "bond", "between", "j"],
  onset: ["file"],
  impurities: ["name", "group", "cell"],
} as const;

export type StudySectionName = keyof typeof studyKeys;

/** The sections that have the key, as a hint where it stands in the wrong one. */
export function sectionsWithKey(written: string): string[] {
  const key = written.toLowerCase().replaceAll("_", "-");
  return Object.entries(studyKeys).flatMap(([section, keys]) =>
    section !== "" && (keys as readonly string[]).includes(key) ? [section] : [],
  );
}
