/// <reference lib="dom" />
import { existsSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { resultFolder } from "@kvane/core/reports";
import { type Browser, type BrowserContextOptions, chromium, type Page } from "playwright-core";
import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { kvane } from "../cli/command.js";
import { hostile, listed, listedFiles, rockSalt, runAnswer } from "../support/report-answers.js";

/** Debian's browser; elsewhere the tests are skipped, and their title says why. */
const executable = "/usr/bin/chromium";
const missing = !existsSync(executable);

interface Opened {
  readonly page: Page;
  /** Errors of the console and of scripts, dialogs, and everything asked of a network. */
  readonly complaints: string[];
}

describe.skipIf(missing)(`the report in a browser${missing ? ` (skipped: there is no ${executable})` : ""}`, () => {
  const folder = mkdtempSync(join(tmpdir(), "kvane-browser-"));
  let browser: Browser;

  beforeAll(async () => {
    browser = await chromium.launch({
      executablePath: executable,
      args: ["--no-sandbox", "--disable-quic", "--disable-background-networking"],
    });
    const { status, stderr } = await kvane(["report", "--example", "--out", "example.html"], { cwd: folder });
    expect({ status, stderr }).toEqual({ status: 0, stderr: "written: example.html\n" });
    for (const { name, text } of await resultFolder(await runAnswer(rockSalt))) writeFileSync(join(folder, name), text);
  });

  afterAll(async () => {
    await browser?.close();
    rmSync(folder, { recursive: true, force: true });
  });

  async function open(file: string, options: BrowserContextOptions = {}, prepare?: () => void): Promise<Opened> {
    const context = await browser.newContext({ viewport: { width: 1280, height: 900 }, ...options });
    const page = await context.newPage();
    const complaints: string[] = [];
    page.on("console", (message) => {
      if (message.type() === "error") complaints.push(message.text());
    });
    page.on("pageerror", (error) => complaints.push(error.message));
    page.on("dialog", (dialog) => {
      complaints.push(`dialog ${dialog.message()}`);
      void dialog.dismiss();
    });
    page.on("request", (request) => {
      if (!request.url().startsWith("file:")) complaints.push(`request ${request.url()}`);
    });
    if (prepare) await page.addInitScript(prepare);
    await page.goto(pathToFileURL(join(folder, file)).href);
    return { page, complaints };
  }

  const peaks = (page: Page) => page.locator("#figure-peaks .peak").count();

  /** Picture elements of the canvas that are not its background, and a number that changes with any of them. */
  const inked = (page: Page) =>
    page.evaluate(() => {
      const canvas = document.querySelector("canvas") as HTMLCanvasElement;
      const copy = document.createElement("canvas");
      [copy.width, copy.height] = [canvas.width, canvas.height];
      const flat = copy.getContext("2d") as CanvasRenderingContext2D;
      flat.drawImage(canvas, 0, 0);
      const { data } = flat.getImageData(0, 0, copy.width, copy.height);
      let [count, mix] = [0, 0];
      for (let at = 3; at < data.length; at += 4)
        if ((data[at] ?? 0) > 0) {
          count += 1;
          mix = (mix * 31 + at + (data[at - 1] ?? 0)) % 1_000_003;
        }
      return { count, mix };
    });

  test("opens without an error or a request, and its chart shows every peak", async () => {
    const { page, complaints } = await open("example.html");
    expect(await page.title()).toContain("Oxide with two magnetic sites (invented)");
    // Every peak of the example, 13, is on the chart, as it is in the table.
    await page.waitForSelector("#figure-peaks .tools");
    expect(await peaks(page)).toBe(13);
    expect(await page.locator("#peaks tbody tr").count()).toBe(13);
    expect(await page.locator("#figure-peaks .lane").count()).toBe(6);
    expect(await page.locator("#figure-peaks .residual").count()).toBe(12);
    expect(complaints).toEqual([]);
    await page.context().close();
  });

  test("the chart is zoomed by keyboard, buttons and mouse, and peaks are read off", async () => {
    const { page, complaints } = await open("example.html");
    const stage = page.locator("#figure-peaks .stage");
    const readout = page.locator("#figure-peaks .readout");
    await stage.focus();
    for (let press = 0; press < 3; press++) await page.keyboard.press("+");
    await expect.poll(() => peaks(page)).toBeLessThan(8);
    await page.keyboard.press("Home");
    await expect.poll(() => peaks(page)).toBe(13);
    await page.keyboard.press("n");
    await page.keyboard.press("n");
    await expect.poll(() => readout.textContent()).toContain("Peak 2 at 21.530");
    await page.getByRole("button", { name: "Look closer" }).click();
    await expect.poll(() => peaks(page)).toBeLessThan(13);
    await stage.dblclick({ position: { x: 300, y: 60 } });
    await expect.poll(() => peaks(page)).toBe(13);
    const box = (await stage.boundingBox()) as { x: number; y: number; width: number };
    await page.mouse.move(box.x + 100, box.y + 80);
    await page.mouse.down();
    await page.mouse.move(box.x + 300, box.y + 80, { steps: 4 });
    await page.mouse.up();
    await expect.poll(() => peaks(page)).toBeLessThan(6);
    await page.locator("#figure-peaks select").selectOption({ index: 3 });
    await page.getByRole("button", { name: "Show the whole range" }).click();
    // Candidate 4 matches all 13.
    await expect.poll(() => page.locator("#figure-peaks .residual").count()).toBe(13);
    expect(complaints).toEqual([]);
    await page.context().close();
  });

  test("the moments are drawn, and turn by keyboard and mouse; another arrangement is another picture", async () => {
    const { page, complaints } = await open("example.html");
    await page.locator("#branch-1-moments-view").scrollIntoViewIfNeeded();
    await page.waitForSelector("canvas");
    await expect.poll(async () => (await inked(page)).count).toBeGreaterThan(5000);
    const first = await inked(page);
    await page.locator("canvas").focus();
    await page.keyboard.press("ArrowRight");
    await expect.poll(async () => (await inked(page)).mix).not.toBe(first.mix);
    const second = await inked(page);
    const box = (await page.locator("canvas").boundingBox()) as { x: number; y: number };
    await page.mouse.move(box.x + 200, box.y + 200);
    await page.mouse.down();
    await page.mouse.move(box.x + 260, box.y + 230, { steps: 3 });
    await page.mouse.up();
    await expect.poll(async () => (await inked(page)).mix).not.toBe(second.mix);
    const third = await inked(page);
    await page.locator("#branch-1-moments-view select").selectOption({ index: 2 });
    await expect.poll(async () => (await inked(page)).mix).not.toBe(third.mix);
    expect(complaints).toEqual([]);
    await page.context().close();
  });

  test("another configuration is chosen by keyboard, and shown; the graph of subgroups has all of them", async () => {
    const { page, complaints } = await open("example.html");
    await page.locator("#branch-1-configuration-moments-view").scrollIntoViewIfNeeded();
    const canvas = page.locator("#branch-1-configuration-moments-view canvas");
    await canvas.waitFor();
    const select = page.locator("#branch-1-configuration-moments-view select");
    const names = await select.locator("option").allTextContents();
    expect(await page.locator("#branch-1-subgroups .configuration").count()).toBe(names.length);
    const shown = () => canvas.evaluate((node) => (node as HTMLCanvasElement).toDataURL());
    await expect.poll(async () => (await shown()).length).toBeGreaterThan(5000);
    const before = await shown();
    await select.focus();
    await page.keyboard.press("ArrowDown");
    await expect.poll(() => select.inputValue()).toBe(names[1]);
    await expect.poll(shown).not.toBe(before);
    expect(complaints).toEqual([]);
    await page.context().close();
  });

  test("the zone turns", async () => {
    const { page } = await open("example.html");
    const drawing = () => page.locator("#figure-zone svg").innerHTML();
    const before = await drawing();
    await page.locator("#figure-zone .stage").focus();
    await page.keyboard.press("ArrowLeft");
    await expect.poll(drawing).not.toBe(before);
    await page.keyboard.press("Home");
    await expect.poll(drawing).toBe(before);
    await page.context().close();
  });

  test("without a script, and without WebGL, the drawings and tables are there", async () => {
    const plain = await open("example.html", { javaScriptEnabled: false });
    expect(await peaks(plain.page)).toBe(13);
    for (const figure of ["#figure-peaks svg", "#figure-zone svg", "#branch-1-moments-1 svg"])
      expect(await plain.page.locator(figure).first().isVisible()).toBe(true);
    expect(await plain.page.locator("#branch-1-moments-view").textContent()).toContain(
      "the drawings below show the same",
    );
    await plain.page.context().close();
    const flat = await open("example.html", {}, () => {
      HTMLCanvasElement.prototype.getContext = () => null;
    });
    await flat.page.locator("#branch-1-moments-view").scrollIntoViewIfNeeded();
    await expect
      .poll(() => flat.page.locator("#branch-1-moments-view").textContent())
      .toContain("does not draw solids");
    expect(flat.complaints).toEqual([]);
    await flat.page.context().close();
  });

  test("on a phone nothing is wider than the screen, in either scheme", async () => {
    for (const colorScheme of ["light", "dark"] as const) {
      const { page, complaints } = await open("example.html", { viewport: { width: 390, height: 800 }, colorScheme });
      await page.waitForSelector("#figure-peaks .tools");
      for (const details of await page.locator("details").all())
        await details.evaluate((one) => one.setAttribute("open", ""));
      expect(await page.evaluate(() => document.documentElement.scrollWidth)).toBeLessThanOrEqual(390);
      expect(complaints).toEqual([]);
      await page.context().close();
    }
  });

  test("a hostile title stays text, and no other script can run", async () => {
    const { page, complaints } = await open("report.html");
    expect(await page.locator("h1").textContent()).toBe(hostile);
    expect(await page.locator("img").count()).toBe(0);
    expect(complaints).toEqual([]);
    await expect(page.addScriptTag({ content: "document.title = 'run'" })).rejects.toThrow();
    expect(await page.title()).not.toBe("run");
    await page.context().close();
  });

  test("every drawing of a folder is XML, and draws", async () => {
    const { page } = await open("report.html");
    for (const study of [await runAnswer(rockSalt), await runAnswer(listed, listedFiles)])
      for (const { name, text } of await resultFolder(study)) {
        if (!name.endsWith(".svg")) continue;
        const marks = await page.evaluate((source) => {
          const parsed = new DOMParser().parseFromString(source, "image/svg+xml");
          return parsed.querySelector("parsererror") ? -1 : parsed.querySelectorAll("path, circle, text").length;
        }, text);
        expect(marks, name).toBeGreaterThan(10);
      }
    await page.context().close();
  });

  test("every table has a caption and named columns, every drawing a name, and the page one main part", async () => {
    const { page } = await open("example.html");
    await page.waitForSelector("#figure-peaks .tools");
    const problems = await page.evaluate(() => {
      const found: string[] = [];
      for (const table of document.querySelectorAll("table")) {
        if (!table.caption?.textContent) found.push("a table without a caption");
        for (const head of table.querySelectorAll("th")) if (!head.scope) found.push(`no scope: ${head.textContent}`);
        for (const head of table.querySelectorAll("thead th")) if (!head.textContent) found.push("an empty head");
      }
      for (const drawing of document.querySelectorAll("svg"))
        for (const id of (drawing.getAttribute("aria-labelledby") ?? "none").split(" "))
          if (!document.getElementById(id)?.textContent) found.push(`no name: ${id}`);
      for (const button of document.querySelectorAll("button, select"))
        if (!button.getAttribute("aria-label") && !button.closest("label")) found.push("a control without a name");
      if (document.querySelectorAll("main").length !== 1) found.push("not one main part");
      return found;
    });
    expect(problems).toEqual([]);
    // The first key press leads past the contents.
    await page.keyboard.press("Tab");
    expect(await page.evaluate(() => document.activeElement?.textContent)).toBe("To the report");
    await page.context().close();
  });
});
