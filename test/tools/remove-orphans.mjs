// @ts-check
/**
 * Removes from the `dist` folders what no source file stands behind any more: `tsc -b` leaves such files, they would be
 * packed, and a test could pass on code that is gone.
 */
import { existsSync, readdirSync, rmSync } from "node:fs";
import { join } from "node:path";
import { root } from "./paths.mjs";

const output = /(?:\.d\.ts|\.js)(?:\.map)?$/;

for (const name of ["core", "cli"]) {
  const dist = join(root, "packages", name, "dist");
  const source = join(root, "packages", name, "src");
  if (!existsSync(dist)) continue;
  for (const file of readdirSync(dist, { recursive: true, encoding: "utf8" })) {
    if (output.test(file) && !existsSync(join(source, file.replace(output, ".ts")))) rmSync(join(dist, file));
  }
}
