import type { LineCounter, Node, Pair, Scalar, YAMLMap, YAMLSeq } from "yaml";
import { note, type ProblemList } from "./problem-list.js";
import type { StudyPlace } from "./study-types.js";
import type { TreeEntry, TreeNode } from "./yaml-tree.js";

/** What is needed to turn nodes of the YAML reader into a tree with places. */
export interface TreeContext {
  readonly yaml: typeof import("yaml");
  readonly lineCounter: LineCounter;
  readonly text: string;
  readonly problems: ProblemList;
}

/** The node as plain data; aliases, keys that are no words and doubled keys are noted. */
export function convertNode(context: TreeContext, node: Node | null, path: string): TreeNode {
  const { yaml, text, problems } = context;
  if (yaml.isScalar(node)) return convertScalar(context, node, path);
  if (yaml.isSeq(node)) return convertList(context, node as YAMLSeq<Node>, path);
  if (yaml.isMap(node)) return convertRecord(context, node as YAMLMap<Node, Node | null>, path);
  const place = placeOf(context, node, path);
  if (!node) return { shape: "nothing", refused: false, place };
  note(problems, "syntax", "an alias stands for a value", {
    where: where(place),
    expected: "the value itself",
    found: text.slice(node.range?.[0], node.range?.[1]),
    remedy: "write the value out",
  });
  return { shape: "nothing", refused: true, place };
}

function convertScalar(context: TreeContext, node: Scalar, path: string): TreeNode {
  const source = node.source ?? "";
  const quoted = node.type === "QUOTE_DOUBLE" || node.type === "QUOTE_SINGLE";
  const start = (node.range?.[0] ?? 0) + (quoted ? 1 : 0);
  const verbatim = !source.includes("\n") && source === source.trim() && context.text.startsWith(source, start);
  const place = { ...placeAt(context, start, path), verbatim };
  if (!quoted && /^(~|null|)$/i.test(source)) return { shape: "nothing", refused: false, place };
  return { shape: "text", text: source.trim(), place };
}

function convertList(context: TreeContext, node: YAMLSeq<Node>, path: string): TreeNode {
  const items = node.items.map((item, index) => convertNode(context, item, `${path}[${index}]`));
  return { shape: "list", items, place: placeOf(context, node, path) };
}

function convertRecord(context: TreeContext, node: YAMLMap<Node, Node | null>, path: string): TreeNode {
  const lineOfKey = new Map<string, number | null>();
  const entries: TreeEntry[] = [];
  for (const pair of node.items) {
    const entry = convertPair(context, pair, path);
    if (!entry) continue;
    const earlier = lineOfKey.get(entry.key);
    if (earlier === undefined) {
      lineOfKey.set(entry.key, entry.keyPlace.line);
      entries.push(entry);
      continue;
    }
    note(context.problems, "syntax", `the key \`${entry.key}\` is given twice`, {
      where: where(entry.keyPlace),
      expected: "every key once",
      found: `${entry.key} in line ${earlier} and again in line ${entry.keyPlace.line}`,
      remedy: "remove one of the two",
    });
  }
  return { shape: "record", entries, place: placeOf(context, node, path) };
}

function convertPair(context: TreeContext, pair: Pair<Node, Node | null>, path: string): TreeEntry | null {
  const { yaml, text, problems } = context;
  if (!yaml.isScalar(pair.key)) {
    note(problems, "syntax", "a key is no plain word", {
      where: where(placeOf(context, pair.key, path)),
      expected: "a word before the colon",
      found: text.slice(pair.key?.range?.[0], pair.key?.range?.[1]),
      remedy: "write `key: value`",
    });
    return null;
  }
  const key = (pair.key.source ?? "").trim();
  const inner = path === "" ? key : `${path}.${key}`;
  const keyPlace = placeOf(context, pair.key, inner);
  const value = convertNode(context, pair.value, inner);
  // An empty value stands behind its key, sometimes lines below; the key is what a reader looks for.
  const empty = value.shape === "nothing" && !value.refused;
  return { key, keyPlace, value: empty ? { ...value, place: keyPlace } : value };
}

function placeOf(context: TreeContext, node: Node | null, path: string): StudyPlace {
  return placeAt(context, node?.range?.[0] ?? 0, path);
}

function placeAt(context: TreeContext, offset: number, path: string): StudyPlace {
  const { line, col } = context.lineCounter.linePos(offset);
  return { file: context.problems.file, line, column: col, path: path || null, argument: null, verbatim: false };
}

/** The place as problems have it. */
export function where({ line, column, path }: StudyPlace): {
  line: number | null;
  column: number | null;
  path: string | null;
} {
  return { line, column, path };
}
