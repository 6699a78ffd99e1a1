/** The first place where a text breaks the grammar of JSON. */
export interface JsonFault {
  /** Counted from 1, in UTF-16 units, as everywhere in kvane. */
  readonly column: number;
  readonly expected: string;
  readonly found: string;
}

const blank = /[ \t\r\n]*/y;
const word = /-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?|true|false|null/y;
const escaped = /["\\/bfnrt]|u[0-9a-fA-F]{4}/y;

/** What may come next; an "end" is the closing bracket of the list or object that is open. */
type Wanted = "value" | "value or end" | "name" | "name or end" | "colon" | "comma or end" | "nothing";

const wantedTexts: { readonly [wanted in Wanted]: string } = {
  "value": "a value",
  "value or end": "a value or ]",
  "name": "a name in double quotation marks",
  "name or end": "a name in double quotation marks, or }",
  "colon": "a colon",
  "comma or end": "a comma or the closing bracket",
  "nothing": "nothing more",
};

/**
 * The first fault of a JSON text (RFC 8259), or null. `JSON.parse` says where only in words that differ from engine to
 * engine, and takes the last of two values of one name without a word, which is a fault here. No recursion: brackets in
 * any depth are no danger.
 */
export function jsonFault(text: string): JsonFault | null {
  const open: { readonly end: "}" | "]"; readonly names: Set<string> }[] = [];
  let wanted: Wanted = "value";
  let at = 0;
  for (;;) {
    at = behind(blank, text, at) ?? at;
    const char = text[at];
    if (char === undefined) return wanted === "nothing" ? null : faultAt(text, at, wantedTexts[wanted]);
    const inner = open.at(-1);
    if (wanted === "colon" && char === ":") {
      wanted = "value";
      at += 1;
    } else if (wanted.endsWith("or end") && char === inner?.end) {
      open.pop();
      wanted = open.length === 0 ? "nothing" : "comma or end";
      at += 1;
    } else if (wanted === "comma or end" && char === ",") {
      wanted = inner?.end === "}" ? "name" : "value";
      at += 1;
    } else if (wanted.startsWith("name") && char === '"') {
      const end = stringEnd(text, at);
      if (typeof end !== "number") return end;
      const name = JSON.parse(text.slice(at, end)) as string;
      if (inner?.names.has(name)) return faultAt(text, at, `the name ${JSON.stringify(name)} once`, "it stands twice");
      inner?.names.add(name);
      wanted = "colon";
      at = end;
    } else if (wanted.startsWith("value")) {
      if (char === "{" || char === "[") {
        open.push({ end: char === "{" ? "}" : "]", names: new Set() });
        wanted = char === "{" ? "name or end" : "value or end";
        at += 1;
        continue;
      }
      const end = char === '"' ? stringEnd(text, at) : behind(word, text, at);
      if (end === null) return faultAt(text, at, wantedTexts[wanted]);
      if (typeof end !== "number") return end;
      wanted = open.length === 0 ? "nothing" : "comma or end";
      at = end;
    } else return faultAt(text, at, wantedTexts[wanted]);
  }
}

/** Where a match that begins at `at` ends, or null. */
function behind(expression: RegExp, text: string, at: number): number | null {
  expression.lastIndex = at;
  return expression.test(text) ? expression.lastIndex : null;
}

/** Where a text in quotation marks ends; read step by step, because one expression over megabytes runs out of stack. */
function stringEnd(text: string, start: number): number | JsonFault {
  let at = start + 1;
  for (;;) {
    const char = text[at];
    if (char === undefined) return faultAt(text, at, "a closing quotation mark");
    if (char === '"') return at + 1;
    if (char < " ") return faultAt(text, at, "no control characters within a text: \\n and \\t stand for them");
    if (char !== "\\") at += 1;
    else {
      const end = behind(escaped, text, at + 1);
      if (end === null) return faultAt(text, at, 'one of \\" \\\\ \\/ \\b \\f \\n \\r \\t \\uXXXX');
      at = end;
    }
  }
}

const shownCharacters = 20;

function faultAt(text: string, at: number, expected: string, found?: string): JsonFault {
  const rest = text.slice(at, at + shownCharacters);
  const shown = rest === "" ? "the end of the line" : JSON.stringify(rest).slice(1, -1).replaceAll('\\"', '"');
  return { column: at + 1, expected, found: found ?? shown };
}
