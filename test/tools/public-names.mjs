// @ts-check
/**
 * Every name that `@kvane/core` exports. `node test/tools/public-names.mjs --update` writes the list that a test
 * compares with, so that each change of the public surface is seen in a diff.
 */
import { existsSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import ts from "typescript";
import { root } from "./paths.mjs";

/** @typedef {{entry: string, name: string, kind: "value" | "type"}} PublicName */

/** The committed list. */
export const listFile = join(root, "test/fixtures/public-names.txt");

/**
 * @returns {PublicName[]} in the order of the entries, then of the names
 */
export function publicNames() {
  const { exports } = JSON.parse(readFileSync(join(root, "packages/core/package.json"), "utf8"));
  const entries = Object.entries(exports)
    .map(([subpath, conditions]) => ({ entry: `@kvane/core${subpath.slice(1)}`, source: conditions["kvane-source"] }))
    .filter(({ source }) => source)
    .map(({ entry, source }) => ({ entry, file: join(root, "packages/core", source) }))
    .filter(({ file }) => existsSync(file));
  const program = ts.createProgram(
    entries.map(({ file }) => file),
    {
      target: ts.ScriptTarget.ES2022,
      module: ts.ModuleKind.NodeNext,
      moduleResolution: ts.ModuleResolutionKind.NodeNext,
      customConditions: ["kvane-source"],
      noLib: true,
      types: [],
    },
  );
  const checker = program.getTypeChecker();
  return entries.flatMap(({ entry, file }) => {
    const source = program.getSourceFile(file);
    const module = source && checker.getSymbolAtLocation(source);
    if (!module) throw new Error(`${file} exports nothing`);
    return checker
      .getExportsOfModule(module)
      .map((symbol) => ({ entry, name: symbol.name, kind: kindOf(symbol) }))
      .sort((a, b) => (a.name < b.name ? -1 : 1));
  });

  /**
   * @param {ts.Symbol} symbol
   * @returns {"value" | "type"}
   */
  function kindOf(symbol) {
    const origin = symbol.flags & ts.SymbolFlags.Alias ? checker.getAliasedSymbol(symbol) : symbol;
    return origin.flags & ts.SymbolFlags.Value && !isTypeExport(symbol) ? "value" : "type";
  }
}

/**
 * `export { type Name }` exports the type alone, also of a class.
 * @param {ts.Symbol} symbol
 */
function isTypeExport(symbol) {
  return !!symbol.declarations?.some(
    (node) => ts.isExportSpecifier(node) && (node.isTypeOnly || node.parent.parent.isTypeOnly),
  );
}

/**
 * The list as text, one name a line.
 * @param {readonly PublicName[]} names
 */
export function namesText(names) {
  return names.map(({ entry, name, kind }) => `${entry} ${name}${kind === "type" ? " (type)" : ""}\n`).join("");
}

if (process.argv[1] && import.meta.url === pathToFileURL(process.argv[1]).href) {
  const text = namesText(publicNames());
  if (process.argv.includes("--update")) writeFileSync(listFile, text);
  else process.stdout.write(text);
}
