import { createReadStream, readFileSync, statSync } from "node:fs";
import { join, resolve } from "node:path";
import { fail, KvaneError } from "@kvane/core/errors";
import { boundedBytes, largestFile } from "./bounded-bytes.js";
import { examplePrefix } from "./example-files.js";
import type { Surroundings } from "./surroundings.js";
import { systemFault } from "./system-faults.js";

/** The text of a file, or of standard input (`-`). */
export async function readText(path: string, surroundings: Surroundings): Promise<string> {
  return decoded(path === "-" ? await surroundings.standardInput() : await bytesOf(path, surroundings), path);
}

async function bytesOf(path: string, { folder }: Surroundings): Promise<Uint8Array> {
  try {
    const full = located(path, folder);
    const found = statSync(full);
    // A pipe or a device has no size; it may make one wait, and Ctrl-C is to be heard meanwhile.
    if (!found.isFile() && !found.isDirectory()) return await boundedBytes(createReadStream(full));
    if (found.size > largestFile) refuseSize(path, `${Math.ceil(found.size / 1024 / 1024)} MB`);
    return readFileSync(full);
  } catch (error) {
    return refuseReading(path, error);
  }
}

/** A file, or standard input (`-`), as it comes: of any size, never whole in memory. */
export async function* partsOf(path: string, surroundings: Surroundings): AsyncGenerator<Uint8Array> {
  const { inputParts, standardInput, folder } = surroundings;
  try {
    if (path !== "-") yield* createReadStream(located(path, folder));
    else if (inputParts) yield* inputParts();
    else yield await standardInput();
  } catch (error) {
    refuseReading(path, error);
  }
}

function refuseReading(path: string, error: unknown): never {
  if (error instanceof KvaneError) throw error;
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

function refuseSize(path: string, found: string): never {
  fail("file-too-large", `\`${path}\` is too large to be read`, {
    where: { file: path },
    expected: "a file of at most 256 MB",
    found,
    remedy: "cut out the part that is meant, and leave images and raw data away",
  });
}

function located(path: string, folder: string): string {
  if (!path.startsWith(examplePrefix)) return resolve(folder, path);
  return join(import.meta.dirname, "../example", path.slice(examplePrefix.length));
}

function decoded(bytes: Uint8Array, path: string): string {
  if (bytes.length > largestFile) refuseSize(path, "more than that");
  try {
    return new TextDecoder("utf-8", { fatal: true }).decode(bytes);
  } catch {
    const { offset, line, column } = firstWrongByte(bytes);
    return fail("file-unreadable", `\`${path}\` is not text in UTF-8`, {
      where: { file: path, line, column },
      expected: "text in UTF-8",
      found: `the byte 0x${(bytes[offset] ?? 0).toString(16).toUpperCase().padStart(2, "0")} at offset ${offset}`,
      remedy: "save it as plain text in UTF-8",
    });
  }
}

/** Where the bytes stop to be UTF-8: the offset (from 0) of the first byte that no character has there. */
function firstWrongByte(bytes: Uint8Array): { offset: number; line: number; column: number } {
  let low = 0;
  let high = bytes.length;
  // The longest beginning that can be decoded, if not all of its last character is asked for.
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if (isBeginning(bytes.subarray(0, middle))) low = middle;
    else high = middle - 1;
  }
  // A first byte whose followers are wrong is the wrong one.
  while (low > 0 && !isWhole(bytes.subarray(0, low))) low -= 1;
  const before = new TextDecoder("utf-8").decode(bytes.subarray(0, low), { stream: true }).split(/\r\n?|\n/);
  return { offset: low, line: before.length, column: (before.at(-1) ?? "").length + 1 };
}

function isBeginning(bytes: Uint8Array): boolean {
  return isWhole(bytes, { stream: true });
}

function isWhole(bytes: Uint8Array, options: { stream?: boolean } = {}): boolean {
  try {
    new TextDecoder("utf-8", { fatal: true }).decode(bytes, options);
    return true;
  } catch {
    return false;
  }
}
