import { createHash } from "node:crypto";
import { appendFileSync, existsSync, mkdirSync, readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import type { Counts } from "./units.js";

export const root = fileURLToPath(new URL("../../", import.meta.url));

/** What the result of a unit depends on; any change makes the sweep begin anew. */
const rooms = ["errors", "numbers", "spacegroups", "kvectors", "irreps", "modes"];
const sources = [...rooms.map((room) => `packages/core/src/${room}`), "test/support", "test/certify", "test/fixtures"];

/** Finished units, kept in an ignored folder so that a broken run goes on where it was. */
export interface State {
  readonly done: ReadonlyMap<string, Counts>;
  readonly keep: (name: string, counts: Counts) => void;
}

export function openState(): State {
  const folder = join(root, "node_modules/.cache/kvane/certify");
  mkdirSync(folder, { recursive: true });
  const file = join(folder, `${fingerprint()}.jsonl`);
  const done = new Map<string, Counts>();
  // The last line may be cut off.
  for (const line of existsSync(file) ? readFileSync(file, "utf8").split("\n").slice(0, -1) : []) {
    const { name, counts } = JSON.parse(line) as { name: string; counts: Counts };
    done.set(name, counts);
  }
  return {
    done,
    keep: (name, counts) => {
      done.set(name, counts);
      appendFileSync(file, `${JSON.stringify({ name, counts })}\n`);
    },
  };
}

function fingerprint(): string {
  const hash = createHash("sha256");
  for (const folder of sources)
    for (const entry of readdirSync(join(root, folder), { recursive: true, withFileTypes: true })
      .filter((item) => item.isFile())
      .map((item) => join(item.parentPath, item.name))
      .sort())
      hash.update(entry.slice(root.length)).update("\0").update(readFileSync(entry)).update("\0");
  return hash.digest("hex").slice(0, 16);
}
