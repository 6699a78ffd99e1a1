import { fail, KvaneError, nowhere, type Place } from "../../errors/index.js";
import type { JobHost } from "../request.js";

/**
 * The text of a file that a request or a study names. What is wrong with reading it stands where the study names the
 * file, or else at the option and the file itself.
 */
export async function readNamed(host: JobHost, path: string, where: Partial<Place>): Promise<string> {
  try {
    return await host.readText(path);
  } catch (error) {
    const place: Place = { ...nowhere, ...(where.file ? where : { ...where, file: path }) };
    if (error instanceof KvaneError)
      throw new KvaneError(
        error.problems.map(({ where: { line, column }, ...one }) => ({
          ...one,
          // A line of the file itself says more than its name does.
          where: place.file === path && place.line === null ? { ...place, line, column } : place,
        })),
      );
    const found = error instanceof Error ? error.message : String(error);
    return fail("file-unreadable", `\`${path}\` cannot be read`, { where: place, expected: "a text file", found });
  }
}

/** A file name in a study counts from the folder of the study; absolute ones stay. */
export function besideStudy(study: string, file: string): string {
  if (/^([a-z]:)?[\\/]/i.test(file)) return file;
  const end = Math.max(study.lastIndexOf("/"), study.lastIndexOf("\\"));
  return study.slice(0, end + 1) + file;
}
