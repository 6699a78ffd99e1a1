import { readFileSync } from "node:fs";
import { join, resolve } from "node:path";
import { fail, type Place } from "@kvane/core/errors";
import type { JobHost, Request } from "@kvane/core/job";
import { argumentNames, type RequestField } from "@kvane/core/job";
import type { Surroundings } from "./surroundings.js";
import { systemFault } from "./system-faults.js";

/** Paths that begin so are files of the bundled example. */
const examplePrefix = "example:/";

/** The bundled example study. */
export const exampleStudy = `${examplePrefix}study.yaml`;

/** A host that reads files, and remembers what it read so that a problem can show its line. */
export interface CommandHost extends JobHost {
  readonly sourceLine: (request: Request | null, place: Place) => string | null;
}

/** The files, the cancel signal and the progress line of one run of the command. */
export function commandHost(surroundings: Surroundings, progress: JobHost["progress"]): CommandHost {
  const texts = new Map<string, string>();
  return {
    signal: surroundings.signal,
    ...(progress ? { progress } : {}),
    readText: async (path) => {
      const text = decoded(path === "-" ? await surroundings.standardInput() : bytesOf(path, surroundings), path);
      texts.set(path, text);
      return text;
    },
    sourceLine: (request, place) => {
      if (place.file !== null) return place.line === null ? null : (lineOf(texts.get(place.file), place.line) ?? null);
      return request === null ? null : argumentText(request, place);
    },
  };
}

function lineOf(text: string | undefined, line: number): string | undefined {
  return text?.replace(/^\uFEFF/, "").split(/\r\n?|\n/)[line - 1];
}

/** The text of the option that a problem is about. */
function argumentText(request: Request, place: Place): string | null {
  const field = (Object.keys(argumentNames) as RequestField[]).find((name) => argumentNames[name] === place.argument);
  const value = field === undefined ? null : request[field];
  if (typeof value === "string") return value.trim();
  if (!Array.isArray(value)) return null;
  // A repeated option is told apart by its path, `sites[1]`.
  const index = Number(/\[(\d+)\]/.exec(place.path ?? "")?.[1] ?? (value.length === 1 ? 0 : Number.NaN));
  return (value as readonly string[])[index]?.trim() ?? null;
}

function bytesOf(path: string, { folder }: Surroundings): Uint8Array {
  try {
    return readFileSync(located(path, folder));
  } catch (error) {
    const code = (error as NodeJS.ErrnoException).code ?? "";
    if (code === "ENOENT" || code === "ENOTDIR" || code === "ENAMETOOLONG")
      fail("file-not-found", `there is no file \`${path}\``, {
        where: { file: path },
        expected: "a file that exists",
        found: "none",
        remedy: "check the name; a name in a study counts from the folder of the study",
      });
    const { found } = systemFault(code);
    return fail("file-unreadable", `\`${path}\` cannot be read`, {
      where: { file: path },
      expected: "a text file",
      found,
      remedy: code === "EISDIR" ? "name a file in it" : "check the file and its permissions",
    });
  }
}

function located(path: string, folder: string): string {
  if (!path.startsWith(examplePrefix)) return resolve(folder, path);
  return join(import.meta.dirname, "../example", path.slice(examplePrefix.length));
}

function decoded(bytes: Uint8Array, path: string): string {
  try {
    return new TextDecoder("utf-8", { fatal: true }).decode(bytes);
  } catch {
    return fail("file-unreadable", `\`${path}\` is not text in UTF-8`, {
      where: { file: path },
      expected: "text in UTF-8",
      found: "bytes that are none",
      remedy: "save it as plain text in UTF-8",
    });
  }
}
