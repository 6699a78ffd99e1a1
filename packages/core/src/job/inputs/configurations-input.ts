import type { ArmChoice, ConfigurationOptions } from "../../configurations/index.js";
import { fail } from "../../errors/index.js";
import { argumentNames, type Request } from "../request.js";
import { numberOption } from "./number-input.js";

/** What the options say of the configurations that are wanted; labels may be written without the Γ. */
export function configurationOptionsOf(request: Request): ConfigurationOptions {
  const limit = numberOption(request, "limit", { from: 1, whole: true });
  const sets = (request.together ?? []).map(labelsOf);
  return {
    arms: armsOf(request),
    ...(sets.length === 0 ? {} : { together: sets }),
    ...(request.onSites ? { onSites: Object.fromEntries(request.onSites.map(siteLabelsOf)) } : {}),
    ...(limit === null ? {} : { limit }),
  };
}

/** What can be chosen from: the irreps of k, the sites and how many arms the star has. */
export interface ConfigurationChoices {
  readonly irreps: readonly string[];
  readonly sites: readonly string[];
  readonly arms: number;
}

/** Refuses names that are none of those, with the option that they stand in. */
export function checkChoices({ arms, together, onSites }: ConfigurationOptions, choices: ConfigurationChoices): void {
  const noIrrep = (label: string) => `k has no irrep \`${label}\``;
  checkNames("together", (together ?? []).flat(), choices.irreps, noIrrep);
  checkNames("onSites", Object.keys(onSites ?? {}), choices.sites, (label) => `there is no site \`${label}\``);
  checkNames("onSites", Object.values(onSites ?? {}).flat(), choices.irreps, noIrrep);
  const numbers = typeof arms === "object" ? arms.map((index) => String(index + 1)) : [];
  const known = Array.from({ length: choices.arms }, (_, index) => String(index + 1));
  checkNames("arms", numbers, known, (number) => `the star has no arm ${number}`);
}

function checkNames(
  field: "together" | "onSites" | "arms",
  names: readonly string[],
  known: readonly string[],
  message: (name: string) => string,
): void {
  const wrong = names.find((name) => !known.includes(name));
  if (wrong !== undefined)
    fail("invalid-argument", message(wrong), {
      where: { argument: argumentNames[field] },
      expected: known.join(", "),
      found: wrong,
      remedy: "take one of those",
    });
}

/** `pair`, `all`, or numbers of arms as the text counts them, from 1. */
function armsOf({ arms }: Request): ArmChoice {
  const text = arms?.trim() ?? "pair";
  if (text === "pair" || text === "all") return text;
  const numbers = text.split(/[\s,;]+/).map(Number);
  if (numbers.length > 0 && numbers.every((number) => Number.isSafeInteger(number) && number >= 1))
    return numbers.map((number) => number - 1);
  return fail("invalid-argument", `\`${text}\` names no arms`, {
    where: { argument: argumentNames.arms },
    expected: "pair, all, or numbers of arms from 1 on, such as 1,2",
    found: text,
    remedy: "kvane star lists the arms with their numbers",
  });
}

function labelsOf(text: string): string[] {
  return text
    .split(/[\s,+]+/)
    .filter((word) => word !== "")
    .map((word) => (/^\d+$/.test(word) ? `Γ${word}` : word.replace(/^[Gg](?=\d)/, "Γ")));
}

/** `SITE: Γ2` or `SITE: Γ2+Γ3`. */
function siteLabelsOf(text: string): [string, string[]] {
  const [site = "", labels = "", ...more] = text.split(":").map((part) => part.trim());
  if (site !== "" && labels !== "" && more.length === 0) return [site, labelsOf(labels)];
  return fail("invalid-argument", `\`${text}\` gives no site its irreps`, {
    where: { argument: argumentNames.onSites },
    expected: "SITE: IRREPS, such as Fe1: Γ2",
    found: text,
    remedy: 'write --on-site "Fe1: 2", once for each site',
  });
}
