// @ts-check
import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { root } from "./paths.mjs";
import { sourceFiles } from "./source-files.mjs";

/** All that may stand at the top of the repository, besides dot-files and `tsconfig*.json`. */
const topEntries = new Set([
  "README.md",
  "DEVELOPERS.md",
  "LICENSE",
  "CITATION.cff",
  "package.json",
  "pnpm-lock.yaml",
  "pnpm-workspace.yaml",
  "biome.json",
  "vitest.config.ts",
  "packages",
  "spacegroup-data",
  "test",
  "docs",
]);

/** Made by the tools and never committed. */
const ignoredEntries = new Set(["node_modules", "coverage"]);

/**
 * What stands at the top and should not.
 * @param {string} [base] the repository
 */
export function topEntryProblems(base = root) {
  return readdirSync(base)
    .filter((name) => !topEntries.has(name) && !ignoredEntries.has(name) && !/^\.|^tsconfig.*\.json$/.test(name))
    .map((name) => `${name}: does not belong at the top of the repository (test/tools/check-files.mjs has the list)`);
}

const longest = 400;
const allowanceFile = "test/tools/long-files.txt";

/**
 * Files of more than 400 lines without a reason, and reasons without such a file.
 * @param {string} [base] the repository
 */
export function lengthProblems(base = root) {
  const allowed = new Map(
    readFileSync(join(base, allowanceFile), "utf8")
      .split("\n")
      .filter((line) => line !== "" && !line.startsWith("#"))
      .map((line) => /** @type {[string, string]} */ ([line.split(" ")[0], line.slice(line.indexOf(" ") + 1)])),
  );
  /** @type {string[]} */
  const problems = [];
  for (const [file, text] of texts(base)) {
    const lines = text.split("\n").length - 1;
    if (lines <= longest) continue;
    if (!allowed.delete(file)) problems.push(`${file}: ${lines} lines; split it, or give a reason in ${allowanceFile}`);
  }
  for (const file of allowed.keys()) problems.push(`${allowanceFile}: ${file} is no longer above ${longest} lines`);
  return problems;
}

// Written in two parts, so that this file does not find itself.
const unfinished = new RegExp(`\\b(?:TO${"DO"}|FIX${"ME"}|XX${"X"})\\b`);
const focused = new RegExp(`\\b(?:describe|test|it)(?:\\.\\w+)*\\.on${"ly"}\\b`);

/**
 * Notes of unfinished work, and tests that silence all others.
 * @param {string} [base] the repository
 */
export function leftoverProblems(base = root) {
  /** @type {string[]} */
  const problems = [];
  for (const [file, text] of texts(base)) {
    text.split("\n").forEach((line, index) => {
      if (unfinished.test(line)) problems.push(`${file}:${index + 1}: unfinished: ${line.trim()}`);
      if (focused.test(line)) problems.push(`${file}:${index + 1}: a focused test silences the others`);
    });
  }
  return problems;
}

/**
 * @param {string} base
 * @returns {[string, string][]} path and text of every edited program file
 */
function texts(base) {
  return ["packages", "spacegroup-data", "test"]
    .flatMap((folder) => sourceFiles(folder, base))
    .map((file) => [file, readFileSync(join(base, file), "utf8")]);
}
