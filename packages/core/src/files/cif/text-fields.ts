/**
 * What a text field means. Its first line may announce two protocols (CIF 1.1, common semantic features, line folding;
 * CIF 2.0, text prefix): `\` folds, so that a line which ends in `\` goes on in the next one; `PREFIX\` takes PREFIX off
 * every line, `PREFIX\\` does both. Blanks may follow a backslash. A field that only looks so, because a line has not
 * the prefix, is taken as it stands.
 *
 * @param content between the opening `;` and the line end before the closing one, with `\n` line ends
 */
export function textFieldContent(content: string): string {
  const lineEnd = content.indexOf("\n");
  const first = lineEnd < 0 ? content : content.slice(0, lineEnd);
  const announced = /^([^\\]*)(\\\\?)[ \t]*$/.exec(first);
  if (!announced) return content;
  const [, prefix = "", marks = ""] = announced;
  const lines = lineEnd < 0 ? [] : content.slice(lineEnd + 1).split("\n");
  if (prefix === "") return marks === "\\" ? unfolded(lines) : content;
  if (!lines.every((line) => line.startsWith(prefix))) return content;
  const plain = lines.map((line) => line.slice(prefix.length));
  return marks === "\\\\" ? unfolded(plain) : plain.join("\n");
}

function unfolded(lines: readonly string[]): string {
  let text = "";
  lines.forEach((line, index) => {
    const fold = /\\[ \t]*$/.exec(line);
    if (fold) text += line.slice(0, fold.index);
    else text += index === lines.length - 1 ? line : `${line}\n`;
  });
  return text;
}
