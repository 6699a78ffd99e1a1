// @ts-check
/**
 * Whether the packed packages work with each Node that they promise to work with: `npm run check:nodes`, outside CI
 * because it fetches programs of 100 MB from the package registry. A version that cannot be installed here is skipped
 * with a message; the one that runs this is always among them. All must give the same bytes.
 */
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { packAndInstall } from "./pack.mjs";
import { publicNames } from "./public-names.mjs";
import { runProgram } from "./run-program.mjs";
import { usePacked } from "./use-packed.mjs";

const versions = ["22", "24"];

const folder = mkdtempSync(join(tmpdir(), "kvane-nodes-"));
process.once("exit", () => rmSync(folder, { recursive: true, force: true }));

const names = publicNames();
const project = packAndInstall(folder);
const first = usePacked(project, process.execPath, names);
console.log(`Node ${process.version}: works`);

for (const version of versions) {
  const node = installed(version);
  if (node === null) continue;
  const found = usePacked(project, node, names);
  const same = found.answer === first.answer && found.printed === first.printed;
  console.log(`Node ${runProgram(node, ["--version"]).trim()}: ${same ? "works, with the same bytes" : "other bytes"}`);
  if (!same) process.exitCode = 1;
}

/**
 * The program of that version from the package registry, or null with a message.
 * @param {string} version
 */
function installed(version) {
  const name = `node-${process.platform === "win32" ? "win" : process.platform}-${process.arch}`;
  const place = join(folder, `node-${version}`);
  mkdirSync(place);
  writeFileSync(join(place, "package.json"), '{"private": true}\n');
  try {
    runProgram("npm", ["install", "--ignore-scripts", "--no-audit", "--no-fund", `${name}@${version}`], place);
    const program = join(place, "node_modules", name, process.platform === "win32" ? "bin/node.exe" : "bin/node");
    runProgram(program, ["--version"]);
    return program;
  } catch (error) {
    const [reason = ""] = (error instanceof Error ? error.message : String(error)).split("\n");
    console.log(`Node ${version}: skipped, ${name}@${version} cannot be installed here (${reason})`);
    return null;
  }
}
