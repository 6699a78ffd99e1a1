import ts from "typescript";
import type { Operator } from "./mutant.js";

/** A change at a place of the text. */
export interface Change {
  readonly operator: Operator;
  readonly start: number;
  readonly end: number;
  readonly replacement: string;
}

const kinds = ts.SyntaxKind;

/** Operators between two terms, and what stands in for each. */
const binary = new Map<ts.SyntaxKind, readonly [Operator, string][]>([
  [kinds.PlusToken, [["arithmetic", "-"]]],
  [kinds.MinusToken, [["arithmetic", "+"]]],
  [kinds.AsteriskToken, [["arithmetic", "/"]]],
  [kinds.SlashToken, [["arithmetic", "*"]]],
  [kinds.PercentToken, [["arithmetic", "*"]]],
  [kinds.AsteriskAsteriskToken, [["arithmetic", "*"]]],
  [kinds.PlusEqualsToken, [["arithmetic", "-="]]],
  [kinds.MinusEqualsToken, [["arithmetic", "+="]]],
  [kinds.AsteriskEqualsToken, [["arithmetic", "/="]]],
  [kinds.SlashEqualsToken, [["arithmetic", "*="]]],
  [kinds.EqualsEqualsEqualsToken, [["comparison", "!=="]]],
  [kinds.ExclamationEqualsEqualsToken, [["comparison", "==="]]],
  [
    kinds.LessThanToken,
    [
      ["comparison", ">="],
      ["boundary", "<="],
    ],
  ],
  [
    kinds.LessThanEqualsToken,
    [
      ["comparison", ">"],
      ["boundary", "<"],
    ],
  ],
  [
    kinds.GreaterThanToken,
    [
      ["comparison", "<="],
      ["boundary", ">="],
    ],
  ],
  [
    kinds.GreaterThanEqualsToken,
    [
      ["comparison", "<"],
      ["boundary", ">"],
    ],
  ],
  [kinds.AmpersandAmpersandToken, [["logic", "||"]]],
  [kinds.BarBarToken, [["logic", "&&"]]],
]);

/** Methods and functions, and the one that stands in for each. */
const swapped = new Map([
  ["some", "every"],
  ["every", "some"],
  ["min", "max"],
  ["max", "min"],
  ["floor", "ceil"],
  ["ceil", "floor"],
  ["round", "floor"],
  ["trunc", "ceil"],
  ["find", "findLast"],
  ["findIndex", "findLastIndex"],
  ["indexOf", "lastIndexOf"],
  ["startsWith", "endsWith"],
  ["endsWith", "startsWith"],
  ["push", "unshift"],
]);

/** Methods that give something of the kind they are called on: the call is left out. */
const leftOut = new Set(["filter", "sort", "reverse", "slice", "trim", "concat"]);

/** The changes that start at this node itself. Nodes of types never come here. */
export function changesOf(node: ts.Node, source: ts.SourceFile): Change[] {
  const whole = (operator: Operator, replacement: string, target: ts.Node = node): Change => ({
    operator,
    start: target.getStart(source),
    end: target.getEnd(),
    replacement,
  });
  const text = (part: ts.Node): string => part.getText(source);

  if (ts.isBinaryExpression(node)) return binaryChanges(node, whole, text);
  if (ts.isPrefixUnaryExpression(node)) return unaryChanges(node, whole, text);
  if (ts.isCallExpression(node)) return callChanges(node, whole, text);
  if (ts.isNumericLiteral(node)) return integerChanges(node, whole);
  if (ts.isStringLiteral(node) || ts.isNoSubstitutionTemplateLiteral(node))
    return [whole("text", node.text === "" ? '"mutant"' : '""')];
  if (ts.isTemplateExpression(node)) return [whole("text", '""')];
  if (node.kind === kinds.TrueKeyword) return [whole("condition", "false")];
  if (node.kind === kinds.FalseKeyword) return [whole("condition", "true")];
  if (ts.isSpreadElement(node)) return [whole("spread", "...[]")];
  if (ts.isSpreadAssignment(node)) return [whole("spread", "...{}")];
  if (ts.isIfStatement(node)) return decided(node.expression, whole);
  if (ts.isConditionalExpression(node)) return decided(node.condition, whole);
  // Without its end a loop would only run for ever.
  if (ts.isWhileStatement(node) || ts.isDoStatement(node)) return [whole("condition", "false", node.expression)];
  if (ts.isForStatement(node) && node.condition) return [whole("condition", "false", node.condition)];
  if (ts.isPropertyAccessExpression(node) && node.questionDotToken)
    return [whole("fallback", ".", node.questionDotToken)];
  if (ts.isElementAccessExpression(node) && node.questionDotToken)
    return [whole("fallback", "", node.questionDotToken)];
  return statementChanges(node, whole);
}

type Whole = (operator: Operator, replacement: string, target?: ts.Node) => Change;
type Text = (part: ts.Node) => string;

function binaryChanges(node: ts.BinaryExpression, whole: Whole, text: Text): Change[] {
  const { operatorToken, left, right } = node;
  if (operatorToken.kind === kinds.QuestionQuestionToken)
    return [whole("fallback", `(${text(left)})`), whole("fallback", `(${text(right)})`)];
  // Only numbers are added here; texts are joined.
  const joins = operatorToken.kind === kinds.PlusToken || operatorToken.kind === kinds.PlusEqualsToken;
  if (joins && [left, right].some((part) => ts.isStringLiteralLike(part) || ts.isTemplateExpression(part))) return [];
  return (binary.get(operatorToken.kind) ?? []).map(([operator, token]) => whole(operator, token, operatorToken));
}

function unaryChanges(node: ts.PrefixUnaryExpression, whole: Whole, text: Text): Change[] {
  if (node.operator === kinds.ExclamationToken) return [whole("negation", `(${text(node.operand)})`)];
  if (node.operator === kinds.MinusToken) return [whole("arithmetic", `(${text(node.operand)})`)];
  return [];
}

function callChanges(node: ts.CallExpression, whole: Whole, text: Text): Change[] {
  const { expression } = node;
  if (!ts.isPropertyAccessExpression(expression)) return [];
  const name = expression.name.text;
  const other = swapped.get(name);
  if (other !== undefined) return [whole("method", other, expression.name)];
  if (leftOut.has(name)) return [whole("removed call", `(${text(expression.expression)})`)];
  const [argument] = node.arguments;
  return name === "abs" && argument ? [whole("removed call", `(${text(argument)})`)] : [];
}

function integerChanges(node: ts.NumericLiteral, whole: Whole): Change[] {
  const value = Number(node.text);
  if (!Number.isSafeInteger(value)) return [];
  return [whole("integer", value === 1 ? "0" : String(value + 1))];
}

function decided(condition: ts.Expression, whole: Whole): Change[] {
  return [whole("condition", "true", condition), whole("condition", "false", condition)];
}

function statementChanges(node: ts.Node, whole: Whole): Change[] {
  const goes =
    ts.isExpressionStatement(node) ||
    ts.isThrowStatement(node) ||
    ts.isContinueStatement(node) ||
    (ts.isBreakStatement(node) && !ts.isCaseOrDefaultClause(node.parent)) ||
    (ts.isReturnStatement(node) && leavesEarly(node));
  return goes ? [whole("removed statement", ";")] : [];
}

/** A return that an `if` decides on. */
function leavesEarly(node: ts.ReturnStatement): boolean {
  const around = ts.isBlock(node.parent) ? node.parent.parent : node.parent;
  return ts.isIfStatement(around);
}
