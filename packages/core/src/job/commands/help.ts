import { fail, nearMiss } from "../../errors/index.js";
import type { HelpRecord } from "../../reports/index.js";
import { helpTopics } from "../help/topics.js";
import { optionOf } from "../inputs/given.js";
import type { Work } from "../work.js";

/** `kvane help TOPIC`: conventions and formats. */
export function helpCommand({ request }: Work): HelpRecord {
  const topics = Object.keys(helpTopics);
  const given = optionOf(request, "topic");
  const name = given === null ? "topics" : given.text.toLowerCase();
  const topic = Object.hasOwn(helpTopics, name) ? helpTopics[name] : undefined;
  if (topic === undefined) {
    const near = nearMiss(name, topics);
    fail("invalid-argument", `there is no help on \`${given?.text ?? name}\``, {
      where: given?.where ?? {},
      expected: `one of ${topics.join(", ")}, or a command`,
      found: given?.text ?? name,
      remedy: near === null ? "`kvane help` lists the topics" : `did you mean \`${near}\`?`,
    });
  }
  return { topic: name, title: topic.title, text: topic.text, topics };
}
