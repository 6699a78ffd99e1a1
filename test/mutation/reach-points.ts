import ts from "typescript";

/**
 * Reach points: the statements and the expressions that are bodies of arrow functions. A test that does not come to
 * the point of a mutant cannot notice it and need not run.
 */
export function pointOf(node: ts.Node): ts.Node {
  for (let current = node; ; current = current.parent) {
    const { parent } = current;
    if (!parent || isPoint(current)) return current;
    // What a parameter defaults to is computed when the function is called, not where it is declared.
    if (ts.isParameter(current)) {
      const { body } = parent as ts.FunctionLikeDeclaration;
      if (body) return ts.isBlock(body) ? (body.statements[0] ?? body) : body;
    }
  }
}

function isPoint(node: ts.Node): boolean {
  if (ts.isBlock(node) || ts.isFunctionDeclaration(node)) return false;
  if (ts.isImportDeclaration(node) || ts.isExportDeclaration(node)) return false;
  if (ts.isInterfaceDeclaration(node) || ts.isTypeAliasDeclaration(node)) return false;
  return ts.isStatement(node) || isBodyOfArrow(node);
}

function isBodyOfArrow(node: ts.Node): boolean {
  return ts.isArrowFunction(node.parent) && node.parent.body === node && !ts.isBlock(node);
}

/**
 * The text with a note at every point: `reachNotes[number of the point] = 1`.
 * @param numberOf gives the point that starts at a place of this file its number
 */
export function withNotes(text: string, numberOf: (start: number) => number): string {
  const source = ts.createSourceFile("noted.ts", text, ts.ScriptTarget.ES2022, true);
  const insertions: { at: number; closes: boolean; text: string }[] = [];
  const visit = (node: ts.Node): void => {
    if (node.parent && isPoint(node)) {
      const at = node.getStart(source);
      const note = `reachNotes[${numberOf(at)}] = 1`;
      if (isBodyOfArrow(node)) insertions.push(...around(at, `(${note}, `, node.getEnd(), ")"));
      else if (standsInList(node)) insertions.push({ at, closes: false, text: `${note}; ` });
      else insertions.push(...around(at, `{ ${note}; `, node.getEnd(), " }"));
    }
    ts.forEachChild(node, visit);
  };
  visit(source);
  return insert(text, insertions);
}

function standsInList({ parent }: ts.Node): boolean {
  return ts.isBlock(parent) || ts.isSourceFile(parent) || ts.isCaseOrDefaultClause(parent);
}

interface Insertion {
  readonly at: number;
  readonly closes: boolean;
  readonly text: string;
}

function around(start: number, before: string, end: number, after: string): Insertion[] {
  return [
    { at: start, closes: false, text: before },
    { at: end, closes: true, text: after },
  ];
}

function insert(text: string, insertions: readonly Insertion[]): string {
  // At one place what ends comes before what begins; the sort keeps the order of outer and inner beginnings.
  const sorted = [...insertions].sort((a, b) => a.at - b.at || Number(b.closes) - Number(a.closes));
  let result = "";
  let from = 0;
  for (const { at, text: added } of sorted) {
    result += text.slice(from, at) + added;
    from = at;
  }
  return result + text.slice(from);
}
