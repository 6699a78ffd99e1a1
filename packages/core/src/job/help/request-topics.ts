import type { HelpTopic } from "./topics.js";

/** Requests in JSON, as other programs send them. */
export const requestTopics: { readonly [topic: string]: HelpTopic } = {
  requests: {
    title: "Requests in JSON: kvane batch",
    text: `kvane batch [FILE] reads one request a line and prints one answer a line, in the same order and at
once; without FILE, or with -, from standard input.
  {"id": 1, "command": "star", "group": "P n m a", "k": "0,u,0"}
  {"command": "modes", "group": "62", "k": "0,1/2,0", "sites": ["Fe 0 0 0", "Mn 0 0 1/2"]}
  {"command": "check", "study": "s.yaml", "texts": {"s.yaml": "group: P n m a\\nk: [[0, 0, 0]]"}}

command      as on the command line; all but batch, completion and the forms --csv, --svg, --out
fields       texts, also for numbers ("wavelength": "2.41"), named as in "input" of --json: the
             option in one word (maxDimension), but sites, impurities, constants, formFactors and
             onSites for what may be repeated; these, exclude, together and vary are lists of texts.
             The first word is group or study, in onset scan, in decompose moments (study its
             parent), in explain code, in help topic. Flags are true or false, null is not given.
files        by name, as on the command line (not -, which holds the requests), or along with the
             request in "texts", which is looked up first, by the exact name. The bundled example is
             "study": "example:/study.yaml".
id           optional, text or number: it comes back as the first field of the answer.

An answer is the JSON of --json on one line, without blanks. A line that is no request is answered
too, with its errors: there are as many answers as lines. The exit status is 0 when every line was
answered, whatever the answers say: look at "errors" of each. 2: FILE cannot be read. 130: stopped;
the answers that stand are whole. A line has at most 64 MB. A schema: requestSchema() from
@kvane/core/job.`,
  },
};
