// @ts-check
import { readdirSync } from "node:fs";
import { join } from "node:path";
import { leftoverProblems, lengthProblems, topEntryProblems } from "./check-files.mjs";
import { importProblems } from "./check-imports.mjs";
import { manifestProblems } from "./check-manifests.mjs";
import { root } from "./paths.mjs";

/** Every rule of the house by name, each giving the list of what breaks it. */
export const houseRules = {
  "imports follow the table of rooms": () => importProblems(),
  "nothing else stands at the top": () => topEntryProblems(),
  "long files have a reason": () => lengthProblems(),
  "nothing is left unfinished or focused": () => leftoverProblems(),
  "one version, one licence, one subpath a public room": () => manifestProblems(existingRooms()),
};

/** The rooms of core that have a door. */
function existingRooms() {
  return readdirSync(join(root, "packages/core/src"), { recursive: true, encoding: "utf8" })
    .map((file) => /^([a-z]+)[\\/]index\.ts$/.exec(file)?.[1] ?? "")
    .filter((room) => room !== "");
}
