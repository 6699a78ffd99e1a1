import ts from "typescript";
import type { Mutant } from "./mutant.js";
import { changesOf } from "./operators.js";
import { pointOf } from "./reach-points.js";

/** Calls that make an error: code, message, details. Only the code and the place are more than words for people. */
const errorCalls = new Set(["fail", "problem"]);

/** Functions inside the rooms that hand words on to an error. */
const wordCalls = new Set(["refuse", "report", "wrong"]);

/** Every mutant of a file, in the order of its text. */
export function findMutants(file: string, text: string): Mutant[] {
  const source = ts.createSourceFile(file, text, ts.ScriptTarget.ES2022, true);
  const found: Mutant[] = [];
  const visit = (node: ts.Node): void => {
    if (leftAlone(node)) return;
    for (const change of changesOf(node, source)) {
      const { line, character } = source.getLineAndCharacterOfPosition(change.start);
      found.push({
        file,
        ...change,
        line: line + 1,
        column: character + 1,
        change: `${oneLine(text.slice(change.start, change.end))} → ${oneLine(change.replacement)}`,
        point: pointOf(node).getStart(source),
      });
    }
    ts.forEachChild(node, visit);
  };
  visit(source);
  return found.sort((a, b) => a.start - b.start || a.end - b.end);
}

/** What holds no behaviour: types, imports, names of properties, words of errors, steps of loops. */
function leftAlone(node: ts.Node): boolean {
  if (ts.isTypeNode(node) || ts.isInterfaceDeclaration(node) || ts.isTypeAliasDeclaration(node)) return true;
  if (ts.isImportDeclaration(node) || ts.isExportDeclaration(node)) return true;
  const { parent } = node;
  if (!parent) return false;
  if (ts.isPropertyAssignment(parent) && parent.name === node) return true;
  if (ts.isForStatement(parent) && parent.incrementor === node) return true;
  return isErrorText(node, parent);
}

function isErrorText(node: ts.Node, parent: ts.Node): boolean {
  if (ts.isNewExpression(parent)) return /Error$/.test(parent.expression.getText()) && parent.expression !== node;
  if (isCallOf(parent, wordCalls)) return ts.isStringLiteralLike(node) || ts.isTemplateExpression(node);
  if (isCallOf(parent, errorCalls)) {
    const position = parent.arguments.indexOf(node as ts.Expression);
    return position > 0 && !ts.isObjectLiteralExpression(node);
  }
  // Of the details only the place.
  return (
    ts.isObjectLiteralExpression(parent) &&
    isCallOf(parent.parent, errorCalls) &&
    !(ts.isPropertyAssignment(node) && node.name.getText() === "where")
  );
}

function isCallOf(node: ts.Node, names: ReadonlySet<string>): node is ts.CallExpression {
  return ts.isCallExpression(node) && ts.isIdentifier(node.expression) && names.has(node.expression.text);
}

function oneLine(text: string): string {
  const plain = text.replaceAll(/\s+/g, " ");
  return plain.length > 70 ? `${plain.slice(0, 50)} … ${plain.slice(-15)}` : plain;
}
