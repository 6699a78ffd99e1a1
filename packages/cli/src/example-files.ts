/** Paths that begin so are files of the bundled example. */
export const examplePrefix = "example:/";

/** The bundled example study. */
export const exampleStudy = `${examplePrefix}study.yaml`;

/** The bundled CIF of the same invented compound. */
export const exampleStructure = `${examplePrefix}structure.cif`;
export const exampleMoments = `${examplePrefix}moments.mcif`;

/** Bundled requests for `kvane batch`. */
export const exampleRequests = `${examplePrefix}requests.jsonl`;
