/// <reference lib="dom" />
import { existsSync, readdirSync, readFileSync } from "node:fs";
import { createServer, type Server } from "node:http";
import type { AddressInfo } from "node:net";
import { join } from "node:path";
import { answer, hostOfTexts } from "@kvane/core/job";
import { jsonText } from "@kvane/core/reports";
import { type Browser, chromium, type Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { browserBundle } from "../tools/bundle-browser.mjs";
import { root } from "../tools/paths.mjs";

/** Debian's browser; elsewhere the tests are skipped, and their title says why. */
const executable = "/usr/bin/chromium";
const missing = !existsSync(executable);

/** The example study with the files that it names. */
const folder = join(root, "packages/cli/example");
const texts = Object.fromEntries(readdirSync(folder).map((name) => [name, readFileSync(join(folder, name), "utf8")]));

/** What the page offers to the test. */
interface KvanePage {
  readonly run: (request: object, texts: object) => Promise<string>;
  readonly ask: (
    request: object,
    texts: object,
    cancelAtProgress: boolean,
  ) => Promise<{ readonly json: string; readonly progress: number; readonly free: number }>;
}

const pageProgram = `
import { answer, hostOfTexts } from "@kvane/core/job";
import { jsonText } from "@kvane/core/reports";

const worker = new Worker("web-worker.js", { type: "module" });
let last = 0;

globalThis.kvanePage = {
  run: async (request, texts) => jsonText(await answer(request, hostOfTexts(texts))),
  ask: (request, texts, cancelAtProgress) =>
    new Promise((resolve, reject) => {
      const id = (last += 1);
      let progress = 0;
      let free = 0;
      // Turns of the page's own event loop while the worker works.
      const clock = setInterval(() => { free += 1; }, 5);
      worker.onerror = ({ message }) => reject(new Error(message));
      worker.onmessage = ({ data }) => {
        if (data.id !== id) return;
        if (data.progress) {
          progress += 1;
          if (cancelAtProgress) worker.postMessage({ id, cancel: true });
        } else {
          clearInterval(clock);
          resolve({ json: jsonText(data.answer), progress, free });
        }
      };
      worker.postMessage({ id, request, texts });
    }),
};
`;

const request = { command: "run", study: "study.yaml" };

describe.skipIf(missing)(`@kvane/core in a browser${missing ? ` (skipped: there is no ${executable})` : ""}`, () => {
  let browser: Browser;
  let server: Server;
  let page: Page;
  const complaints: string[] = [];
  let expected = "";

  beforeAll(async () => {
    const { files } = await browserBundle({
      stdin: { contents: pageProgram, resolveDir: root, sourcefile: "page.js" },
      entryPoints: [join(root, "docs/examples/embedding/web-worker.mjs")],
    });
    server = createServer(({ url = "/" }, response) => {
      const name = url.slice(1);
      const file = files.get(name);
      if (name !== "" && file === undefined) response.writeHead(404).end();
      else {
        response.setHeader("content-type", file === undefined ? "text/html" : "text/javascript");
        // Without eval and without any other host, or the browser complains.
        response.setHeader("content-security-policy", "default-src 'self'");
        response.end(
          file ??
            '<!doctype html><title>kvane</title><link rel="icon" href="web-worker.js"><script type="module" src="stdin.js"></script>',
        );
      }
    }).listen(0, "127.0.0.1");
    await new Promise((resolve) => server.once("listening", resolve));
    browser = await chromium.launch({
      executablePath: executable,
      args: ["--no-sandbox", "--disable-quic", "--disable-background-networking"],
    });
    page = await browser.newPage();
    page.on("console", (message) => complaints.push(message.text()));
    page.on("pageerror", (error) => complaints.push(error.message));
    await page.goto(`http://127.0.0.1:${(server.address() as AddressInfo).port}/`);
    await page.waitForFunction(() => "kvanePage" in globalThis);
    const answered = await answer(request, hostOfTexts(texts));
    expect(answered.errors).toEqual([]);
    expected = jsonText(answered);
  }, 120_000);

  afterAll(async () => {
    await browser?.close();
    server?.close();
  });

  const ask = (cancelAtProgress: boolean) =>
    page.evaluate(
      ([what, files, cancel]) => (globalThis as unknown as { kvanePage: KvanePage }).kvanePage.ask(what, files, cancel),
      [request, texts, cancelAtProgress] as const,
    );

  test("does the whole job of the example on a page, byte for byte as in Node", async () => {
    const json = await page.evaluate(
      ([what, files]) => (globalThis as unknown as { kvanePage: KvanePage }).kvanePage.run(what, files),
      [request, texts] as const,
    );
    // Compared as a whole first: a difference of a megabyte is no help.
    if (json !== expected) expect(json.split("\n")).toEqual(expected.split("\n"));
    expect(json).toContain('"branches"');
    expect(complaints).toEqual([]);
  }, 120_000);

  test("does it in a web worker, with progress, while the page stays free", async () => {
    const { json, progress, free } = await ask(false);
    expect(json === expected).toBe(true);
    expect(progress).toBeGreaterThan(0);
    expect(free).toBeGreaterThan(0);
    expect(complaints).toEqual([]);
  }, 120_000);

  test("takes a cancel there", async () => {
    const { json, progress } = await ask(true);
    expect(progress).toBeGreaterThan(0);
    expect(JSON.parse(json)).toMatchObject({ result: null, errors: [{ code: "interrupted" }] });
    expect(complaints).toEqual([]);
  }, 120_000);

  test("says what is wrong on a page as everywhere", async () => {
    const { json } = await page.evaluate(
      ([what, files]) => (globalThis as unknown as { kvanePage: KvanePage }).kvanePage.ask(what, files, false),
      [{ command: "run", study: "none.yaml" }, texts] as const,
    );
    expect(JSON.parse(json).errors).toMatchObject([{ code: "file-not-found" }]);
  });
});
