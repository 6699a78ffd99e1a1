/**
 * What can go wrong and how it is said: a stable code, a place, what was expected, what was found, a remedy. Every
 * room throws `KvaneError`; only the command line turns it into text and an exit status.
 */
export { caretLine } from "./caret-line.js";
export { type ProblemCode, problemCodes } from "./codes.js";
export { fail, KvaneError, placed } from "./kvane-error.js";
export { editDistance, nearMiss } from "./near-miss.js";
export { type Assumption, nowhere, type Place, type Problem, type ProblemDetails, problem } from "./problem.js";
export { isTooLarge, whyNoNumber } from "./too-large.js";
