import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { root } from "../tools/paths.mjs";

export type CifFolder = "good" | "bad" | "structures" | "refused";

/** Where the hand-written CIFs stand (their ORIGIN.md says what they are). */
export function cifPath(folder: CifFolder, name = ""): string {
  return join(root, "test/fixtures/cif", folder, name);
}

export function cifNames(folder: CifFolder): string[] {
  return readdirSync(cifPath(folder)).sort();
}

export function cifText(folder: CifFolder, name: string): string {
  return readFileSync(cifPath(folder, name), "utf8");
}
