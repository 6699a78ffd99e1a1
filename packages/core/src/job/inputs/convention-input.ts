import { fail, nearMiss } from "../../errors/index.js";
import { ownWriting, type WritingConvention } from "../../modes/index.js";
import { argumentNames, type Request } from "../request.js";
import { together } from "../work.js";
import { optionOf } from "./given.js";

const choices: { readonly [field in keyof WritingConvention]: readonly WritingConvention[field][] } = {
  exponent: ["minus", "plus"],
  phase: ["lattice", "position"],
  factor: ["one", "half"],
  components: ["lattice", "crystal", "cartesian"],
};

/** How Fourier components are to be written: the options, kvane's own convention where there are none. */
export async function conventionOf(request: Request): Promise<WritingConvention> {
  return together({
    exponent: () => choiceOf(request, "exponent"),
    phase: () => choiceOf(request, "phase"),
    factor: () => choiceOf(request, "factor"),
    components: () => choiceOf(request, "components"),
  });
}

function choiceOf<F extends keyof WritingConvention>(request: Request, field: F): WritingConvention[F] {
  const given = optionOf(request, field);
  if (given === null) return ownWriting[field];
  const names: readonly WritingConvention[F][] = choices[field];
  const found = names.find((name) => name === given.text.toLowerCase());
  if (found !== undefined) return found;
  const near = nearMiss(given.text, names);
  return fail("invalid-argument", `\`${given.text}\` is no choice of ${argumentNames[field]}`, {
    where: given.where,
    expected: names.join(" or "),
    found: given.text,
    remedy: near === null ? "`kvane help fourier` says what each means" : `did you mean \`${near}\`?`,
  });
}
