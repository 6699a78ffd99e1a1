import { fail, KvaneError, nowhere, type Place } from "../../errors/index.js";
import type { JobHost } from "../request.js";

/**
 * The text of a file that a request or a study names. What is wrong with reading it stands where the study names the
 * file, or else at the option and the file itself.
 */
export async function readNamed(host: JobHost, path: string, where: Partial<Place>): Promise<string> {
  const place: Place = { ...nowhere, ...(where.file ? where : { ...where, file: path }) };
  try {
    const text: unknown = await host.readText(path);
    return typeof text === "string" ? text : refuseNoText(path, text);
  } catch (error) {
    if (error instanceof KvaneError)
      throw new KvaneError(
        error.problems.map(({ where: { line, column }, ...one }) => ({
          ...one,
          // A line of the file itself says more than its name does.
          where: place.file === path && place.line === null ? { ...place, line, column } : place,
        })),
      );
    const found = error instanceof Error ? error.message : String(error);
    // As Node says it; a host that reads with its functions need not know kvane's codes.
    if ((error as { readonly code?: unknown } | null)?.code === "ENOENT")
      return fail("file-not-found", `there is no file \`${path}\``, {
        where: place,
        expected: "a file that exists",
        found: "none",
        remedy: "check the name; a name in a study counts from the folder of the study",
      });
    return fail("file-unreadable", `\`${path}\` cannot be read`, { where: place, expected: "a text file", found });
  }
}

/** A host that is not typed may give bytes, which is no fault of the file. */
function refuseNoText(path: string, found: unknown): never {
  fail("file-unreadable", `\`${path}\` did not come as text`, {
    expected: "a string from `readText`",
    found: found === null ? "null" : typeof found,
    remedy: "let `readText` give the text as a string, read as UTF-8",
  });
}

/** A file name in a study counts from the folder of the study; absolute ones stay. */
export function besideStudy(study: string, file: string): string {
  if (/^([a-z]:)?[\\/]/i.test(file)) return file;
  const end = Math.max(study.lastIndexOf("/"), study.lastIndexOf("\\"));
  return study.slice(0, end + 1) + file;
}
