import type { Place } from "@kvane/core/errors";
import type { JobHost, Request } from "@kvane/core/job";
import { argumentNames, type RequestField } from "@kvane/core/job";
import type { Surroundings } from "./surroundings.js";

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
      const { readText } = await import("./read-text.js");
      const text = await readText(path, surroundings);
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
