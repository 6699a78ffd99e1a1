import type { CommandSpec } from "../command-spec.js";

/** Many requests of other programs; `kvane help requests` has their form. */
export const batchCommands: readonly CommandSpec[] = [
  {
    name: "batch",
    summary: "answer requests in JSON, one a line in, one answer a line out",
    argument: "requests",
    options: ["exampleRequests", "quiet"],
    examples: ["kvane batch --example", "kvane batch requests.jsonl > answers.jsonl"],
    topics: ["requests"],
  },
];
