import { readFileSync } from "node:fs";
import { describe, expect, it } from "vitest";
import { kvane, shellWords } from "../cli/command.js";

/** Pages whose commands run on the bundled example or on nothing but their own words. */
const pages = ["guide.md", "weighing.md"];

interface Shown {
  readonly command: string;
  /** The blocks of text that follow it, in order. */
  readonly blocks: readonly string[];
}

/** Every `kvane …` line of a shell block, with the text blocks behind the last of them. */
function shownIn(page: string): Shown[] {
  const text = readFileSync(new URL(`../../docs/${page}`, import.meta.url), "utf8");
  return [...text.matchAll(/```sh\n([\s\S]*?)```\n((?:\s*```text\n[\s\S]*?```\n)*)/g)].flatMap(
    ([, shell = "", texts = ""]) => {
      const commands = shell.split("\n").filter((line) => line.startsWith("kvane "));
      const blocks = [...texts.matchAll(/```text\n([\s\S]*?)```/g)].map((match) => (match[1] as string).trimEnd());
      return commands.map((command, index) => ({ command, blocks: index === commands.length - 1 ? blocks : [] }));
    },
  );
}

describe.each(pages)("%s", (page) => {
  const shown = shownIn(page);

  it("has commands", () => {
    expect(shown.length).toBeGreaterThan(0);
  });

  it.each(shown.map(({ command, blocks }) => [command, blocks] as const))("%s", async (command, blocks) => {
    const { status, stdout } = await kvane(shellWords(command).slice(1));
    expect(status).toBe(0);
    for (const block of blocks) expect(stdout).toContain(block);
  });
});
