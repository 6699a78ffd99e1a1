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
