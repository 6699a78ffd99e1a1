import { existsSync, mkdirSync, readdirSync, renameSync, rmSync, statSync, writeFileSync } from "node:fs";
import { basename, dirname, join } from "node:path";
import { fail, KvaneError } from "@kvane/core/errors";
import type { ResultFile } from "@kvane/core/reports";
import { systemFault } from "./system-faults.js";
import { removeUnfinished, unfinished } from "./unfinished.js";

/** A place for output: as the user wrote it, and in full. */
export interface OutputPath {
  readonly shown: string;
  readonly full: string;
}

/** Throws `output-exists` unless the place is free or may be replaced: asked before the work, not after it. */
export function checkFree({ shown, full }: OutputPath, force: boolean): void {
  if (shown.trim() === "")
    fail("missing-argument", "--out came without a name", {
      where: { argument: "--out" },
      expected: "the name of a new file or folder",
      found: "nothing",
      remedy: "give a name, or leave --out away",
    });
  if (force || !existsSync(full)) return;
  fail("output-exists", `\`${shown}\` exists already`, {
    where: { argument: "--out" },
    expected: "a name that is free",
    found: statSync(full).isDirectory() ? "a folder" : "a file",
    remedy: "give another name, or --force to replace it",
  });
}

/** Writes a file whole or not at all: under another name in the same folder first, then renamed. */
export function writeWhole(path: OutputPath, text: string, force: boolean): void {
  checkFree(path, force);
  const part = partOf(path.full);
  writing(path, part, () => {
    writeFileSync(part, text, { flag: "wx" });
    renameSync(part, path.full);
  });
}

/** Writes a folder whole or not at all. In a folder that exists (`force`) only files of these names are replaced. */
export function writeFolder(path: OutputPath, files: readonly ResultFile[], force: boolean): void {
  checkFree(path, force);
  const folder = path.full;
  const part = partOf(folder);
  writing(path, part, () => {
    mkdirSync(part);
    for (const { name, text } of files) writeFileSync(join(part, name), text, { flag: "wx" });
    if (!existsSync(folder)) return renameSync(part, folder);
    // Seen before the first file is replaced: a folder with the name of a file cannot be.
    const inTheWay = files.find(({ name }) => statSync(join(folder, name), { throwIfNoEntry: false })?.isDirectory());
    if (inTheWay) throw Object.assign(new Error(inTheWay.name), { code: "EISDIR" });
    for (const name of readdirSync(folder)) if (isStale(name, files)) rmSync(join(folder, name));
    for (const { name } of files) renameSync(join(part, name), join(folder, name));
    rmSync(part, { recursive: true });
  });
}

/** A table or drawing of an earlier run that this one does not have. */
function isStale(name: string, files: readonly ResultFile[]): boolean {
  const ours =
    /^(assignments|branch-\d+-(modes|configurations|satellites|weights|fitted-moments|pattern))\.csv$/.test(name) ||
    /^branch-\d+-Gamma[\w.]*\.mcif$/.test(name) ||
    /^(peaks|zone|phase-diagram|onset|branch-\d+-(moments-\d+|configurations|configuration-Gamma[\w.]*|weights|pattern))\.svg$/.test(
      name,
    );
  return ours && !files.some((file) => file.name === name);
}

/** The name beside it that it has until it is whole. */
function partOf(path: string): string {
  return join(dirname(path), `.${basename(path)}.${process.pid}.part`);
}

function writing({ shown }: OutputPath, part: string, action: () => void): void {
  unfinished.add(part);
  try {
    action();
  } catch (error) {
    removeUnfinished();
    if (error instanceof KvaneError) throw error;
    const { code = "" } = error as NodeJS.ErrnoException;
    // Some folders of the system take no files, and say that they do not exist.
    const { found, remedy } = systemFault(code === "ENOENT" && existsSync(dirname(part)) ? "EINVAL" : code);
    fail("output-failed", `\`${shown}\` could not be written`, {
      where: { argument: "--out" },
      expected: "a place that can be written to",
      found,
      remedy,
    });
  }
  unfinished.delete(part);
}
