import { createRequire } from "node:module";
import { join } from "node:path";
import { compileFunction } from "node:vm";
import { root } from "../tools/paths.mjs";
import type { ModuleGraph, ModuleText } from "./module-graph.js";

type Body = (require: (specifier: string) => unknown, module: object, exports: object, reached: Uint8Array) => unknown;

// What is compiled once may be run any number of times, each time with variables of its own.
const compiled = new WeakMap<ModuleText, Body>();

/**
 * Runs a test file and all that it imports of this repository anew, so that nothing kept from an earlier run is left.
 * `packages` stand in for installed packages of these names; the other packages keep their state.
 */
export async function runAnew(
  file: string,
  graph: ModuleGraph,
  packages: Readonly<Record<string, unknown>>,
  reached: Uint8Array,
): Promise<void> {
  const loaded = new Map<string, { exports: object }>();
  const load = (name: string): object => {
    const known = loaded.get(name);
    if (known) return known.exports;
    const module = { exports: {} };
    loaded.set(name, module);
    start(name, module);
    return module.exports;
  };
  const start = (name: string, module: { exports: object }): unknown => {
    const text = graph.get(name);
    if (text === undefined) throw new Error(`${name} is not among the files of the tests`);
    const native = createRequire(join(root, name));
    const require = (specifier: string): unknown => {
      const target = text.targets[specifier];
      return packages[specifier] ?? (target === undefined ? native(specifier) : load(target));
    };
    return bodyOf(name, text, name === file)(require, module, module.exports, reached);
  };
  await start(file, { exports: {} });
}

/** Only a test file waits for something before its tests are known. */
function bodyOf(name: string, text: ModuleText, waits: boolean): Body {
  const known = compiled.get(text);
  if (known) return known;
  const code = waits ? `return (async () => {${text.code}\n})();` : text.code;
  const body = compileFunction(code, ["require", "module", "exports", "reachNotes"], {
    filename: join(root, name),
  }) as Body;
  compiled.set(text, body);
  return body;
}
