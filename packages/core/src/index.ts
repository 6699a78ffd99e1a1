/**
 * The whole library behind one name. Each room is also an entry of its own, `@kvane/core/spacegroups` and so on, which
 * is what a program that cares for its size imports.
 */
export * from "./configurations/index.js";
export * from "./diffraction/index.js";
export * from "./errors/index.js";
export * from "./exchange/index.js";
export * from "./files/index.js";
export * from "./irreps/index.js";
export * from "./job/index.js";
export * from "./kvectors/index.js";
export * from "./magneticgroups/index.js";
export * from "./modes/index.js";
export * from "./onsets/index.js";
export * from "./reflections/index.js";
export * from "./reports/index.js";
export * from "./search/index.js";
export * from "./spacegroups/index.js";
export * from "./weighing/index.js";
