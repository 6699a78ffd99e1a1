import { createHash } from "node:crypto";
import { appendFileSync, existsSync, mkdirSync, readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { fileURLToPath } from "node:url";
import { bundleText } from "../tools/bundle-test.mjs";
import type { Counts } from "./subject.js";

export const root = fileURLToPath(new URL("../../", import.meta.url));

/** Finished units, kept in an ignored folder so that a broken run goes on where it was. */
export interface State {
  readonly done: ReadonlyMap<string, Counts>;
  readonly keep: (name: string, counts: Counts) => void;
}

export async function openState(subject: string): Promise<State> {
  const folder = join(root, "node_modules/.cache/kvane/certify");
  mkdirSync(folder, { recursive: true });
  const file = join(folder, `${subject}-${await fingerprint(subject)}.jsonl`);
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

/** Of all code that the sweeps of a subject reach, without its comments, and of the reference data. */
async function fingerprint(subject: string): Promise<string> {
  const hash = createHash("sha256").update(await bundleText(join("test/certify", `${subject}.ts`)));
  const fixtures = join(root, "test/fixtures");
  for (const name of readdirSync(fixtures)
    .filter((entry) => /\.jsonl?$/.test(entry))
    .sort())
    hash
      .update(name)
      .update("\0")
      .update(readFileSync(join(fixtures, name)))
      .update("\0");
  return hash.digest("hex").slice(0, 16);
}
