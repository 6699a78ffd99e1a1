/**
 * Whether a text is one XML element whose tags nest, whose attributes are quoted and named once and whose references
 * are known: a slow plain reader that shares nothing with what writes the mark-up.
 */
export function wellFormed(text: string): boolean {
  const body = text.replace(/^<\?xml[^?]*\?>\s*/, "").trim();
  const open: string[] = [];
  let roots = 0;
  let at = 0;
  const token = /<(\/?)([a-zA-Z][\w:-]*)((?:\s+[\w:-]+="[^"<]*")*)\s*(\/?)>|([^<]+)/y;
  while (at < body.length) {
    token.lastIndex = at;
    const found = token.exec(body);
    if (found === null) return false;
    at = token.lastIndex;
    const [, closing, name = "", attributes = "", empty, content] = found;
    if (/&(?!(amp|lt|gt|quot|#39|apos);)/.test(content ?? attributes)) return false;
    if (content !== undefined) {
      if (open.length === 0) return false;
      continue;
    }
    const names = [...attributes.matchAll(/([\w:-]+)="/g)].map(([, one]) => one);
    if (new Set(names).size !== names.length) return false;
    if (open.length === 0 && closing === "") roots += 1;
    if (closing === "/") {
      if (open.pop() !== name) return false;
    } else if (empty === "") open.push(name);
  }
  return roots === 1 && open.length === 0;
}
