import { fail, KvaneError } from "../../errors/index.js";
import type { Study } from "../../files/index.js";
import type { JobHost } from "../request.js";
import { readNamed } from "./read-file.js";

/** The text of the file at `path`; `-` is standard input. A word that is no name of a file was meant as something else. */
export async function studyTextFrom(path: string, host: JobHost, command: string): Promise<string> {
  try {
    return await readNamed(host, path, { file: path, argument: "STUDY" });
  } catch (error) {
    if (!(error instanceof KvaneError) || error.code !== "file-not-found" || /[./\\]/.test(path)) throw error;
    return fail("file-not-found", `\`kvane ${command}\` needs a study file, and there is no file \`${path}\``, {
      where: { argument: "STUDY" },
      expected: "a study file such as study.yaml, or --example",
      found: path,
      remedy: "write the group into a study file; `kvane help study-file` shows one",
    });
  }
}

/** Throws `missing-argument` where a command can do nothing without a study. */
export function needStudy(study: Study | null): Study {
  if (study !== null) return study;
  return fail("missing-argument", "no study was given", {
    where: { argument: "STUDY" },
    expected: "a study file such as study.yaml, or --example",
    found: "nothing",
    remedy: "name a study file, or take --example; `kvane help study-file` shows what is in one",
  });
}
