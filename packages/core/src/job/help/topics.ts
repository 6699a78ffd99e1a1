import { conventionTopics } from "./convention-topics.js";
import { formatTopics } from "./format-topics.js";
import { inputTopics } from "./input-topics.js";
import { physicsTopics } from "./physics-topics.js";
import { requestTopics } from "./request-topics.js";

export interface HelpTopic {
  readonly title: string;
  /** Lines of at most 100 characters. */
  readonly text: string;
}

const pages: { readonly [topic: string]: HelpTopic } = {
  ...inputTopics,
  ...formatTopics,
  ...requestTopics,
  ...physicsTopics,
  ...conventionTopics,
};

/** The pages of `kvane help`, by topic. */
export const helpTopics: { readonly [topic: string]: HelpTopic } = {
  topics: {
    title: "Topics",
    text: [
      ...Object.entries(pages).map(([topic, { title }]) => `  ${topic.padEnd(14)}${title}`),
      "",
      "kvane help TOPIC shows one of them, kvane COMMAND --help the options of a command.",
    ].join("\n"),
  },
  ...pages,
};
