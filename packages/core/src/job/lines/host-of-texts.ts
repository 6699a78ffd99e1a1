import { fail } from "../../errors/index.js";
import type { JobHost } from "../request.js";

/**
 * A host whose files are texts in memory: for pages, workers and requests that bring their files along. A name is looked
 * up exactly as the request or the study gives it (a study `a/study.yaml` that names `peaks.csv` asks for `a/peaks.csv`).
 *
 * @param texts the texts by name
 * @param beyond answers for every other name, and has the cancel signal and the progress callback; without it any other
 *   name is `file-not-found`
 */
export function hostOfTexts(texts: { readonly [name: string]: string }, beyond: Partial<JobHost> = {}): JobHost {
  return {
    ...beyond,
    readText: async (path) => {
      if (Object.hasOwn(texts, path)) return texts[path] as string;
      return beyond.readText === undefined ? failUnknown(path, Object.keys(texts)) : beyond.readText(path);
    },
  };
}

function failUnknown(path: string, names: readonly string[]): never {
  fail("file-not-found", `there is no text with the name \`${path}\``, {
    where: { file: path },
    expected: names.length === 0 ? "a text with this name" : `one of ${names.join(", ")}`,
    found: "none",
    remedy: "give the text under this name; a name in a study counts from the folder of the study",
  });
}
