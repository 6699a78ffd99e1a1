/**
 * What is the answer to a request? `answer` takes plain records with strings as a user typed them and gives the one JSON
 * envelope; the command line, and whatever else calls it, has no logic of its own. It touches nothing but
 * `host.readText`. To see how the whole job goes, read `run-study.ts`.
 */
export { answer, refusal } from "./answer.js";
export { type CommandEntry, commandTable } from "./commands.js";
export { exitStatusOf } from "./exit-status.js";
export { type AnsweredLine, answerLine } from "./lines/answer-line.js";
export { hostOfTexts } from "./lines/host-of-texts.js";
export { requestSchema } from "./lines/request-schema.js";
export { argumentNames, type JobHost, type Request, type RequestField } from "./request.js";
export type { CommandResults } from "./results.js";
export { version } from "./version.js";
export type { Work } from "./work.js";
