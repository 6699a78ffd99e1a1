// @ts-check
/**
 * The commands that `npm run bench` measures; add a line to measure another.
 * @type {readonly {name: string, parameters: readonly string[]}[]}
 */
export const benches = [
  bench("ops", "62"),
  bench("star", "62", "--k", "0,1/2,0"),
  bench("irreps", "62", "--k", "0,1/2,0"),
  bench("modes", "62", "--k", "0,1/2,0", "--site", "Fe 0 0 0"),
];

/** @param {string[]} parameters */
function bench(...parameters) {
  const shown = parameters.map((word) => (word.includes(" ") ? `"${word}"` : word));
  return { name: `kvane ${shown.join(" ")}`, parameters };
}
