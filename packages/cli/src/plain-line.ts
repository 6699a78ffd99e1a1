import { commandSpecs } from "./commands/index.js";
import { flagOf, type OptionSpec, optionSpecs, takesValue } from "./options.js";
import type { ParsedLine } from "./parsed-line.js";

/**
 * The words of a line in which nothing is unusual: a command, at most one word for it, options written out, each with its
 * value behind it. Null for every other line, among them all wrong ones: those are the parser's (`parse-line.ts`), which
 * knows more ways to write options, shows help and says what is wrong, and gives the same for these. Loading and running
 * it would take a fifteenth of a quick command's time.
 */
export function plainLine([command, ...words]: readonly string[]): ParsedLine | null {
  const spec = commandSpecs.find(({ name }) => name === command);
  // The word behind `help` may be a command, whose own help is shown.
  if (spec === undefined || command === "help") return null;
  const taken = new Map(spec.options.map((name) => [flagOf(optionSpecs[name]), optionSpecs[name] as OptionSpec]));
  const options: { [attribute: string]: true | string | string[] } = {};
  let argument: string | null = null;
  for (let index = 0; index < words.length; index++) {
    const word = words[index] as string;
    const option = taken.get(word);
    if (option === undefined) {
      if (argument !== null || (word.startsWith("-") && word !== "-")) return null;
      argument = word;
      continue;
    }
    const attribute = attributeOf(word);
    const before = options[attribute];
    if (!takesValue(option)) {
      options[attribute] = true;
      continue;
    }
    index += 1;
    const value = words[index];
    if (value === undefined || value.startsWith("--")) return null;
    if (!option.repeatable) {
      if (before !== undefined) return null;
      options[attribute] = value;
    } else if (Array.isArray(before)) before.push(value);
    else options[attribute] = [value];
  }
  return { spec, argument, options };
}

/** `qMax` of `--q-max`. */
function attributeOf(flag: string): string {
  return flag.slice(2).replace(/-([a-z])/g, (_, letter: string) => letter.toUpperCase());
}
