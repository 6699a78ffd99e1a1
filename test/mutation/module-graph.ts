import { createHash } from "node:crypto";
import { existsSync, readFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { pathToFileURL } from "node:url";
import ts from "typescript";
import { root } from "../tools/paths.mjs";

/** A file of this repository as plain JavaScript that asks for others by `require`. Paths start at the root. */
export interface ModuleText {
  readonly code: string;
  /** What each specifier means; those that are missing are installed packages. */
  readonly targets: Readonly<Record<string, string>>;
}

export type ModuleGraph = ReadonlyMap<string, ModuleText>;

// Put together, so that bundling leaves these words alone (test/tools/bundle-test.mjs).
const placeWords = ["import", "meta", "url"].join(".");

const read = new Map<string, ModuleText>();

/** The files and all that they import, of this repository. */
export function readGraph(files: readonly string[]): ModuleGraph {
  const graph = new Map<string, ModuleText>();
  const open = [...files];
  for (let file = open.pop(); file !== undefined; file = open.pop()) {
    if (graph.has(file)) continue;
    const module = read.get(file) ?? translated(file, readFileSync(join(root, file), "utf8"));
    read.set(file, module);
    graph.set(file, module);
    open.push(...Object.values(module.targets));
  }
  return graph;
}

export function translated(file: string, text: string): ModuleText {
  if (file.endsWith(".json")) return { code: `module.exports = ${text}`, targets: {} };
  const placed = text.replaceAll(placeWords, JSON.stringify(pathToFileURL(join(root, file)).href));
  const { outputText } = ts.transpileModule(placed, {
    fileName: file.replace(/\.mjs$/, ".js"),
    compilerOptions: {
      module: ts.ModuleKind.CommonJS,
      target: ts.ScriptTarget.ES2022,
      esModuleInterop: true,
      isolatedModules: true,
      allowJs: true,
    },
  });
  const targets: Record<string, string> = {};
  for (const [, specifier = ""] of outputText.matchAll(/\brequire\("([^"]+)"\)/g)) {
    const target = fileOf(specifier, file);
    if (target !== null) targets[specifier] = target;
  }
  return { code: outputText, targets };
}

/** Of all code that a file reaches: it changes when a test of the file may come out otherwise. */
export function fingerprint(file: string, graph: ModuleGraph): string {
  const hash = createHash("sha256");
  for (const name of reachable(file, graph))
    hash
      .update(name)
      .update("\0")
      .update(graph.get(name)?.code ?? "");
  return hash.digest("hex").slice(0, 16);
}

function reachable(file: string, graph: ModuleGraph): string[] {
  const found = new Set([file]);
  for (const name of found) for (const target of Object.values(graph.get(name)?.targets ?? {})) found.add(target);
  return [...found].sort();
}

/** The file of this repository that a specifier means, or null for an installed package. */
function fileOf(specifier: string, from: string): string | null {
  const inside = /^#core\/(.*)$/.exec(specifier);
  if (inside) return sourceOf(`packages/core/src/${inside[1]}`);
  const room = /^@kvane\/core(?:\/([a-z-]+))?$/.exec(specifier);
  if (room) return `packages/core/src/${room[1] === undefined ? "" : `${room[1]}/`}index.ts`;
  return specifier.startsWith(".") ? sourceOf(join(dirname(from), specifier)) : null;
}

/** Imports name the file that is built; the source beside it ends in `.ts`. */
function sourceOf(path: string): string {
  const source = path.replace(/\.js$/, ".ts");
  return existsSync(join(root, source)) ? source : path;
}
