import { fail } from "@kvane/core/errors";
import type { Request } from "@kvane/core/job";
import { exampleMoments, exampleStructure, exampleStudy } from "./example-files.js";
import type { ParsedLine } from "./parsed-line.js";

/** What the command line wants done with the answer. */
export interface OutputWishes {
  readonly json: boolean;
  readonly csv: boolean;
  readonly svg: boolean;
  readonly out: string | null;
  readonly force: boolean;
  readonly quiet: boolean;
}

/** Whether the first word is a file: a study or a CIF. */
function isStudy({ spec, argument }: Pick<ParsedLine, "spec" | "argument">): boolean {
  const first = argument?.trim() ?? null;
  return (
    first !== null &&
    (spec.argument === "study" ||
      spec.argument === "cif" ||
      /\.(ya?ml|m?cif)$/i.test(first) ||
      (first === "-" && spec.argument !== "scan"))
  );
}

/** The words of the command line as a request. */
export function requestFrom({ spec, argument, options }: ParsedLine): Request {
  const text = (name: string) => (typeof options[name] === "string" ? (options[name] as string) : null);
  const example = options["example"] === true;
  const first = argument?.trim() ?? null;
  const isFile = isStudy({ spec, argument });
  const topical = spec.argument === "code" || spec.argument === "topic";
  if (example && isFile)
    fail("conflicting-arguments", "a study and --example are both given", {
      where: { argument: "--example" },
      expected: "one of the two",
      found: first ?? "",
      remedy: "leave one of them out",
    });
  const studyOf = () => {
    if (example) return spec.argument === "cif" ? exampleStructure : exampleStudy;
    return isFile && !topical ? first : null;
  };
  return {
    command: spec.name,
    study: spec.argument === "moments" ? (text("parent") ?? (example ? exampleStudy : null)) : studyOf(),
    moments: spec.argument === "moments" ? (first ?? (example ? exampleMoments : null)) : null,
    child: text("child"),
    group: spec.argument === "group or study" && !isFile ? first : null,
    code: spec.argument === "code" ? first : null,
    topic: spec.argument === "topic" ? first : null,
    structure: text("structure"),
    block: text("block"),
    syntax: options["syntax"] === true,
    k: text("k"),
    within: text("within"),
    from: text("from"),
    to: text("to"),
    full: options["full"] === true,
    cell: text("cell"),
    sites: (options["site"] as readonly string[] | undefined) ?? null,
    polar: options["polar"] === true,
    star: options["star"] === true,
    exponent: text("exponent"),
    phase: text("phase"),
    factor: text("factor"),
    components: text("components"),
    read: text("read"),
    peaks: text("peaks"),
    as: text("as"),
    wavelength: text("wavelength"),
    tolerance: text("tolerance"),
    unmatched: text("unmatched"),
    maxDimension: text("maxDimension"),
    qMax: text("qMax"),
    zeroShift: text("zeroShift"),
    cellScale: text("cellScale"),
    exclude: (options["exclude"] as readonly string[] | undefined) ?? null,
    impurities: (options["impurity"] as readonly string[] | undefined) ?? null,
    nuclear: text("nuclear"),
    ...(options["weighIntensities"] === true ? { weighIntensities: true } : {}),
    arms: text("arms"),
    together: (options["together"] as readonly string[] | undefined) ?? null,
    onSites: (options["onSite"] as readonly string[] | undefined) ?? null,
    limit: text("limit"),
    configuration: text("configuration"),
    cif: text("cif"),
    ...(options["fitted"] === true ? { fitted: true } : {}),
    constants: (options["j"] as readonly string[] | undefined) ?? null,
    vary: (options["vary"] as readonly string[] | undefined) ?? null,
    shells: text("shells"),
    scan: spec.argument === "scan" && !isFile ? first : null,
    reduced: text("reduced"),
    intensities: text("intensities"),
    scale: text("scale"),
    resolution: text("resolution"),
    lorentz: text("lorentz"),
    displacement: text("displacement"),
    scatteringAngle: text("scatteringAngle"),
    domains: text("domains"),
    ...(options["includesNuclear"] === true ? { includesNuclear: true } : {}),
    pattern: text("pattern"),
    formFactors: (options["formFactor"] as readonly string[] | undefined) ?? null,
    branches: text("branches"),
    files: spec.name === "run" && text("out") !== null,
  };
}

export function wishesFrom({ spec, argument, options }: ParsedLine): OutputWishes {
  const wishes = {
    json: options["json"] === true,
    csv: options["csv"] === true,
    svg: options["svg"] === true,
    out: typeof options["out"] === "string" ? options["out"] : null,
    force: options["force"] === true,
    quiet: options["quiet"] === true,
  };
  const forms = (["json", "csv", "svg"] as const).filter((form) => wishes[form]).map((form) => `--${form}`);
  if (forms.length > 1)
    fail("conflicting-arguments", `${forms.join(" and ")} are ${forms.length === 2 ? "both" : "all"} given`, {
      where: { argument: forms.at(-1) as string },
      expected: "one form of output",
      found: forms.length === 2 ? "two" : "three",
      remedy: "leave one of them out",
    });
  // A study may say which constants run: then that is known only behind the work.
  const known = isStudy({ spec, argument }) || options["example"] === true;
  if (wishes.svg && spec.name === "exchange" && options["vary"] === undefined && !known) failUndrawn(false);
  return wishes;
}

/** @param study whether there is a study, which could have named ranges */
export function failUndrawn(study: boolean): never {
  fail("missing-argument", "there is no phase diagram to draw", {
    where: { argument: "--vary" },
    expected: "a constant that runs, or two",
    found: "none",
    remedy: `say which, for example --vary "2 0 1 21"${study ? ", or in the study exchange: [{shell: 2, vary: [0, 1, 21]}]" : ""}, or leave --svg out`,
  });
}
