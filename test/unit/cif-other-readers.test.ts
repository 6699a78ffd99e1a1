import { spawnSync } from "node:child_process";
import { type CifValue, parseCif } from "@kvane/core/files";
import { describe, expect, test } from "vitest";
import { valueAt } from "#core/files/cif/values.js";
import { type CifFolder, cifNames, cifPath, cifText } from "../support/cif-fixtures.js";
import { problemsOf } from "../support/problems-of.js";

/**
 * Two independent readers of Debian, `cif_linguist` (package cif-linguist) and `cif_parse` with `cif2json` (cod-tools),
 * over our fixtures: do they accept and refuse the same, and read the same values? Where they are not installed these
 * tests are skipped.
 */
const installed = ["cif_linguist", "cif_parse", "cif2json"].every(
  (program) => spawnSync(program, ["--help"]).error === undefined,
);
if (!installed) console.warn("skipped: cif_linguist and cod-tools are not installed (Debian: cif-linguist, cod-tools)");

const folders: readonly CifFolder[] = ["good", "bad", "structures", "refused"];

/** What the others let pass although the standard does not allow it: keys and codes that stand twice, long names. */
const overlooked = {
  cif_linguist: ["name-long.cif", "table-key-twice.cif"],
  cif_parse: ["block-twice.cif", "list-glued.cif", "name-long.cif"],
};

/** cif_linguist holds CIF 1.1 to the brackets of CIF 2.0; International Tables G, 2.2.7.1.4 allows them within words. */
const refusedByOne = ["brackets-in-1.1.cif"];

describe.skipIf(!installed)("other readers of CIF", () => {
  test.each(folders)("cif_linguist accepts and refuses in `%s` what kvane does", async (folder) => {
    for (const name of cifNames(folder)) {
      const { status } = spawnSync("cif_linguist", ["-q", "-s", cifPath(folder, name), "/dev/null"]);
      const theirs = refusedByOne.includes(name) || (status === 0 && !overlooked.cif_linguist.includes(name));
      expect((await problemsOf(() => parseCif(cifText(folder, name), name, { strict: true }))).length === 0, name).toBe(
        theirs,
      );
    }
  });

  test.each(folders)("cif_parse accepts and refuses in `%s` what kvane does", async (folder) => {
    const names = cifNames(folder);
    const { stderr } = spawnSync("cif_parse", names, { cwd: cifPath(folder), encoding: "utf8" });
    for (const name of names) {
      const refused = new RegExp(`^\\S+ ${name.replaceAll(".", "\\.")}(\\([\\d,]+\\))?[^\\n]*: ERROR,`, "m").test(
        stderr,
      );
      const theirs = !refused && !overlooked.cif_parse.includes(name);
      expect((await problemsOf(() => parseCif(cifText(folder, name), name, { strict: true }))).length === 0, name).toBe(
        theirs,
      );
    }
  });

  test.each(["good", "structures"] as const)("cif2json reads the same values in `%s`", async (folder) => {
    for (const name of cifNames(folder)) {
      const { stdout } = spawnSync("cif2json", [cifPath(folder, name)], { encoding: "utf8" });
      const document = await parseCif(cifText(folder, name), name);
      const ours = document.blocks.map(({ items, loops }) =>
        Object.fromEntries([
          ...items.map((item) => [item.name.toLowerCase(), [plain(valueAt(document, item.value))]]),
          ...loops.flatMap(({ names, values }) =>
            names.map((one, column) => [
              one.name.toLowerCase(),
              values.filter((_, index) => index % names.length === column).map((at) => plain(valueAt(document, at))),
            ]),
          ),
        ]),
      );
      expect(objectsOf(stdout), name).toEqual(ours);
    }
  });
});

type Plain = string | readonly Plain[] | { readonly [key: string]: Plain };

function plain(value: CifValue): Plain {
  if (value.shape === "text") return value.text;
  if (value.shape === "list") return value.items.map(plain);
  return Object.fromEntries(value.entries.map(({ key, value: inner }) => [key, plain(inner)]));
}

/** The values of each block of a series of JSON objects. */
function objectsOf(text: string): unknown[] {
  return text
    .split(/(?<=\})(?=\{"data":)/)
    .filter((part) => part.trim() !== "")
    .map((part) => {
      const values = JSON.parse(part).data.values as { [name: string]: unknown };
      return Object.fromEntries(Object.entries(values).map(([name, value]) => [name.toLowerCase(), value]));
    });
}
