// @ts-check
import ts from "typescript";

/**
 * One import or re-export of a file.
 * @typedef {{specifier: string, line: number, typeOnly: boolean, lazy: boolean}} Import
 */

/**
 * All imports of a TypeScript text, `import()` and `import("…").Type` among them.
 * @param {string} path
 * @param {string} text
 * @returns {Import[]}
 */
export function readImports(path, text) {
  const file = ts.createSourceFile(path, text, ts.ScriptTarget.ES2022, false);
  /** @type {Import[]} */
  const found = [];
  ts.forEachChild(file, visit);
  return found;

  /** @param {ts.Node} node */
  function visit(node) {
    if (ts.isImportDeclaration(node)) {
      add(node.moduleSpecifier, importsTypesOnly(node.importClause), false);
      return;
    }
    if (ts.isExportDeclaration(node)) {
      if (node.moduleSpecifier) add(node.moduleSpecifier, exportsTypesOnly(node), false);
      return;
    }
    if (ts.isImportTypeNode(node) && ts.isLiteralTypeNode(node.argument)) add(node.argument.literal, true, false);
    if (ts.isCallExpression(node) && node.expression.kind === ts.SyntaxKind.ImportKeyword) {
      const argument = node.arguments[0];
      if (argument) add(argument, false, true);
    }
    ts.forEachChild(node, visit);
  }

  /**
   * @param {ts.Node} node
   * @param {boolean} typeOnly
   * @param {boolean} lazy
   */
  function add(node, typeOnly, lazy) {
    const line = file.getLineAndCharacterOfPosition(node.getStart(file)).line + 1;
    // An address that is put together at run time cannot be held to the table, so it gets a name that no rule allows.
    const specifier = ts.isStringLiteralLike(node) ? node.text : "(computed)";
    found.push({ specifier, line, typeOnly, lazy });
  }
}

/** @param {ts.ImportClause | undefined} clause */
function importsTypesOnly(clause) {
  if (!clause) return false;
  if (clause.phaseModifier === ts.SyntaxKind.TypeKeyword) return true;
  const names = clause.namedBindings;
  if (clause.name || !names || !ts.isNamedImports(names)) return false;
  return names.elements.length > 0 && names.elements.every((element) => element.isTypeOnly);
}

/** @param {ts.ExportDeclaration} node */
function exportsTypesOnly(node) {
  if (node.isTypeOnly) return true;
  const names = node.exportClause;
  return !!names && ts.isNamedExports(names) && names.elements.every((element) => element.isTypeOnly);
}
