// @ts-check
/**
 * The rooms of core in the only direction data flows: what each may import besides itself. It is the table of the
 * contributor's guide in a form that a program can hold us to.
 * @typedef {{values: readonly string[], types: readonly string[] | "any"}} Permission
 */

const base = ["errors", "numbers"];
const groups = [...base, "algorithms"];
const vectors = [...groups, "spacegroups"];
const positions = [...vectors, "kvectors"];
const searching = [...positions, "reflections"];
const representations = [...base, "spacegroups", "kvectors"];
const moments = [...representations, "irreps"];
const configurations = [...moments, "modes", "magneticgroups", "algorithms"];
const scattering = [...searching, "irreps", "modes", "magneticgroups", "configurations"];
const weighing = [...scattering, "diffraction"];
// Reflections for the vectors in a ball and the averaged metric: neighbours are found like reflections.
const coupling = [...searching, "irreps", "modes", "magneticgroups", "configurations"];
const reporting = [...scattering, "search", "diffraction", "weighing", "exchange", "onsets"];

/** @type {Readonly<Record<string, Permission>>} */
export const roomTable = {
  errors: only([]),
  numbers: only(["errors"]),
  algorithms: only(base),
  spacegroups: only(groups),
  // Space groups with time reversal: their types, numbers, symbols and what they allow. No moments, no k.
  magneticgroups: only(vectors),
  kvectors: only(vectors),
  reflections: only(positions),
  search: only(searching),
  irreps: only(representations),
  // Least squares for the question whether equal moment sizes are possible.
  modes: only(["algorithms", ...moments]),
  configurations: only(configurations),
  diffraction: only(scattering),
  weighing: only(weighing),
  exchange: only(coupling),
  onsets: only(groups),
  // Text in, text out: they may speak of every record, but hold no physics of their own.
  files: { values: [...base, "spacegroups", "kvectors", "magneticgroups"], types: "any" },
  reports: { values: [...reporting, "files"], types: "any" },
  job: only([...reporting, "files", "reports"]),
};

/** Rooms that are no part of the public surface: the package has no subpath for them. */
export const innerRooms = ["numbers", "algorithms"];

/**
 * The only importer of a package in core; every other package is forbidden there. `ogl` is for the script of the report
 * page (reports/page), which is bundled into a text.
 */
export const packageImporters = {
  yaml: "files",
  "d3-scale": "reports",
  "d3-shape": "reports",
  "d3-array": "reports",
  ogl: "reports",
};

/** Packages that may be loaded only by `import()`, off the path of a start. */
export const lazyPackages = ["yaml"];

/**
 * @param {readonly string[]} rooms
 * @returns {Permission}
 */
function only(rooms) {
  return { values: rooms, types: rooms };
}
