import { spawnSync } from "node:child_process";
import { createHash } from "node:crypto";
import { join } from "node:path";
import { resultFolder, type WeighDataRecord, type WeighedRecord } from "@kvane/core/reports";
import { describe, expect, test } from "vitest";
import { pageNotices } from "#core/reports/generated/page-script.js";
import { htmlReport, markdownReport } from "#core/reports/made-reports.js";
import { intensityChart } from "#core/reports/svg/intensity-chart.js";
import { escapeMarkup } from "#core/reports/svg/mark-up.js";
import { palette } from "#core/reports/svg/palette.js";
import { peakChart, wholeView } from "#core/reports/svg/peak-chart.js";
import {
  type ChartCandidate,
  type ChartPeak,
  type PeakChartData,
  peakChartData,
} from "#core/reports/svg/peak-chart-data.js";
import { hostile, listed, listedFiles, rockSalt, runAnswer } from "../support/report-answers.js";
import { root } from "../tools/paths.mjs";

/** WCAG 2.2, relative luminance and contrast ratio. */
function contrast(a: string, b: string): number {
  const luminance = (hex: string) => {
    const [red = 0, green = 0, blue = 0] = [1, 3, 5].map((start) => {
      const share = Number.parseInt(hex.slice(start, start + 2), 16) / 255;
      return share <= 0.03928 ? share / 12.92 : ((share + 0.055) / 1.055) ** 2.4;
    });
    return 0.2126 * red + 0.7152 * green + 0.0722 * blue;
  };
  const [light, dark] = [luminance(a), luminance(b)].sort((one, other) => other - one) as [number, number];
  return (light + 0.05) / (dark + 0.05);
}

describe("colours", () => {
  test.each([
    ["light", 0],
    ["dark", 1],
  ] as const)("on %s paper every text has a contrast of 4.5 : 1", (_name, scheme) => {
    const paper = palette.paper[scheme];
    for (const [role, colours] of Object.entries(palette)) {
      if (["paper", "panel", "rule"].includes(role)) continue;
      expect(contrast(colours[scheme], paper), role).toBeGreaterThanOrEqual(4.5);
      expect(contrast(colours[scheme], palette.panel[scheme]), `${role} on a panel`).toBeGreaterThanOrEqual(4.5);
    }
  });
});

describe("mark-up", () => {
  test("is escaped, and what XML does not know is replaced", () => {
    expect(escapeMarkup(`<a href="x">'&`)).toBe("&lt;a href=&quot;x&quot;&gt;&#39;&amp;");
    expect(escapeMarkup("a\u0000b\ud800c\u001bd\te")).toBe("a\ufffdb\ufffdc\ufffdd\te");
  });
});

describe("the page", async () => {
  const answer = await runAnswer(rockSalt);
  const page = htmlReport(answer);

  test("is the same bytes each time, and has no address in it that would be asked", async () => {
    expect(htmlReport(await runAnswer(rockSalt))).toBe(page);
    // What is neither script, style nor a comment: links lead to the page itself, and nothing is loaded.
    const marks = page.replace(/<!--[\s\S]*?-->|<script[\s\S]*?<\/script>|<style[\s\S]*?<\/style>/g, "");
    const links = [...marks.matchAll(/ (?:href|src|srcset|action|data)="([^"]*)"/g)].map(([, link]) => link ?? "");
    expect(links.length).toBeGreaterThan(5);
    expect(links.filter((link) => !link.startsWith("#"))).toEqual([]);
  });

  test("lets its policy allow only its own style and script, by hashes that are right", () => {
    const policy = /http-equiv="Content-Security-Policy" content="([^"]*)"/.exec(page)?.[1] ?? "";
    const hashOf = (name: string) => {
      const text = new RegExp(`<${name}>([\\s\\S]*?)</${name}>`).exec(page)?.[1] ?? "";
      return createHash("sha256").update(text).digest("base64");
    };
    expect(policy).toBe(
      `default-src 'none'; script-src 'sha256-${hashOf("script")}'; style-src 'sha256-${hashOf("style")}'; base-uri 'none'; form-action 'none'`,
    );
    expect(page).not.toMatch(/ style="| on[a-z]+="/);
  });

  test("keeps a hostile title text, everywhere", () => {
    expect(page).toContain(escapeMarkup(hostile));
    expect(page).not.toContain("<img");
    expect(page.match(/<\/script>/g)).toHaveLength(2);
    const markdown = markdownReport(answer, "beside");
    expect(markdown.split("\n")[0]).toBe("# \\<img src=x onerror=alert(1)\\>\\|\\*\\_\\`\\</script\\>\\<!--\\&amp;\"'");
  });

  test("says of a view to be turned that it needs scripts, and both views say where arrows are", () => {
    expect(page).toContain("that can be turned: drawn when it comes into view, for which the page needs scripts;");
    expect(page).toContain("Arrows begin at their atoms");
    expect(page).toContain("Here arrows have their atoms in the middle, in the drawings below they begin at them.");
  });

  test("has the licence texts of what its script is made of", () => {
    for (const name of ["ogl", "d3-scale", "d3-shape", "d3-array"])
      expect(
        pageNotices.some((text) => text.startsWith(`${name} `)),
        name,
      ).toBe(true);
    for (const notice of pageNotices) expect(page).toContain(notice);
  });

  test("says each caution once, and has headings without a gap", () => {
    expect(page.match(/hypotheses until a structure is refined/g)).toHaveLength(1);
    expect(page.match(/trained staff/g)).toHaveLength(1);
    expect(page.match(/The numbers in Γ1, Γ2, … are kvane&#39;s own/g)).toHaveLength(1);
    const levels = [...page.matchAll(/<h([1-6])[ >]/g)].map(([, level]) => Number(level));
    expect(levels[0]).toBe(1);
    levels.forEach((level, index) => {
      if (index > 0) expect(level - (levels[index - 1] ?? 0)).toBeLessThanOrEqual(1);
    });
    const ids = [...page.matchAll(/ id="([^"]*)"/g)].map(([, id]) => id);
    expect(new Set(ids).size).toBe(ids.length);
  });

  test("its script is what the sources give", () => {
    const made = spawnSync(process.execPath, [join(root, "packages/core/make-page-script.mjs"), "--check"]);
    expect(String(made.stderr)).toBe("");
    expect(made.status).toBe(0);
  });
});

test("empty texts leave no element open", async () => {
  const answer = await runAnswer(rockSalt);
  const page = htmlReport({ ...answer, result: answer.result && { ...answer.result, title: "" } });
  expect(page).toContain("<h1></h1>");
  const marks = page.replace(/<!--[\s\S]*?-->|<script[\s\S]*?<\/script>|<style[\s\S]*?<\/style>/g, "");
  const open: string[] = [];
  for (const [, close, name = "", short] of marks.matchAll(/<(\/?)([a-z][a-z0-9]*)[^>]*?(\/?)>/g)) {
    if (short === "/" || name === "meta") continue;
    if (close === "") open.push(name);
    else expect(open.pop()).toBe(name);
  }
  expect(open).toEqual([]);
});

describe("the peak chart", async () => {
  const answer = await runAnswer(listed, listedFiles);
  const record = answer.result as NonNullable<typeof answer.result>;
  const data = peakChartData(record) as NonNullable<ReturnType<typeof peakChartData>>;
  const count = (marks: string, name: string) => marks.match(new RegExp(`class="${name}"`, "g"))?.length ?? 0;

  test("shows every peak, a lane for every candidate, and a residual for every match", () => {
    const { marks } = peakChart(data, wholeView(data));
    expect(count(marks, "peak")).toBe(5);
    expect(count(marks, "lane")).toBe(2);
    expect(count(marks, "residual")).toBe(record.search?.candidates[0]?.matched);
  });

  test("its ticks are where the satellites of the record are, in the unit of the list", () => {
    record.branches.forEach((branch, index) => {
      const ticks = data.candidates[index]?.ticks ?? [];
      const lines = (branch.satellites?.reflections ?? []).map(({ d }) => d).slice(0, ticks.length);
      expect(ticks.length).toBeGreaterThan(5);
      for (const [at, tick] of ticks.entries()) expect(tick).toBeCloseTo(lines[at] as number, 4);
    });
  });

  test("leaves room for a second row of marks where a peak is on a nuclear line and on a λ/2 image", () => {
    const [first, ...others] = data.peaks.map((peak) => ({ ...peak, onNuclear: false })) as [ChartPeak, ...ChartPeak[]];
    const marked = { ...first, onNuclear: true, onHalfWavelength: true };
    const both = peakChart({ ...data, peaks: [marked, ...others] }, wholeView(data));
    const one = peakChart({ ...data, peaks: [{ ...marked, onNuclear: false }, ...others] }, wholeView(data));
    const base = Number(/class="observed".*?<path d="M[\d.]+ ([\d.]+)H/.exec(both.marks)?.[1]);
    const rows = [...both.marks.matchAll(/translate\([\d.]+ ([\d.]+)\)/g)].map(([, y]) => Number(y));
    const lowest = Math.max(...rows.filter((y) => y < base + 30));
    const name = Number(/y="([\d.]+)"[^>]*>[^<]*k = /.exec(both.marks)?.[1]);
    expect(lowest).toBeGreaterThan(base + 10);
    // Letters of 12 units stand above their line; a mark reaches 4 units below its middle.
    expect(name - 12).toBeGreaterThanOrEqual(lowest + 4);
    expect(both.height).toBeGreaterThan(one.height);
  });

  test("says how many peaks have no number for lack of room, and where all are", () => {
    const [peak, candidate] = [data.peaks[0] as ChartPeak, data.candidates[0] as ChartCandidate];
    const crowded: PeakChartData = {
      ...data,
      from: 0,
      to: 40,
      peaks: Array.from({ length: 40 }, (_, index) => ({
        ...peak,
        number: index + 1,
        x: index < 39 ? index / 100 : 39,
      })),
      candidates: [{ ...candidate, ticks: [], assigned: Array.from({ length: 40 }, () => null) }],
    };
    const whole = peakChart(crowded, wholeView(crowded));
    // The first of the crowd and the one apart.
    expect(whole.marks).toContain(">38 of 40 numbers left out; the table of the report has all<");
    const closer = peakChart(crowded, { ...wholeView(crowded), to: 0.391 });
    expect(closer.marks.match(/ font-size="11"/g)).toHaveLength(39);
    expect(closer.marks).not.toContain("left out");
    // Nothing below jumps when somebody looks closer.
    expect(closer.height).toBe(whole.height);
    expect(peakChart(data, wholeView(data)).marks).not.toContain("left out");
  });

  test("a part of it shows the peaks of that part", () => {
    const { marks } = peakChart(data, { ...wholeView(data), from: 4, to: 7 });
    expect(count(marks, "peak")).toBe(2);
  });
});

test.each([
  [10, false],
  [300, true],
])("of %d intensities those without a name are counted below: %s", (count, crowded) => {
  const one = { label: "peak 1", q: 1, twoThetaDeg: null, hkl: null, lines: [], observed: 3, su: 1 };
  const list = Array.from({ length: count }, (_, index) => ({ ...one, label: `peak ${index + 1}` }));
  const data = { sample: "powder", list } as unknown as WeighDataRecord;
  const shown = [{ id: "1.1", calculated: list.map(() => 3) }] as unknown as WeighedRecord[];
  const { marks } = intensityChart(data, shown);
  const named = marks.match(/class="fill-faint" fill="[^"]*">\d+</g)?.length ?? 0;
  const note = ` (${count - named} of ${count} names left out; the table of the report has all)`;
  expect(marks).toContain(`>peak${crowded ? note : ""}<`);
});

describe("the result folder", () => {
  test("has the files that the record names, and drawings that the Markdown shows", async () => {
    const answer = await runAnswer(listed, listedFiles);
    const files = await resultFolder(answer);
    expect(files.map(({ name }) => name)).toEqual(answer.result?.files);
    const markdown = files.find(({ name }) => name === "report.md")?.text ?? "";
    const shown = [...markdown.matchAll(/!\[[^\]]*\]\(([^)]*)\)/g)].map(([, name]) => name);
    const drawings = files.map(({ name }) => name).filter((name) => name.endsWith(".svg"));
    expect(shown.sort()).toEqual(drawings.sort());
    expect(drawings.length).toBeGreaterThanOrEqual(4);
    expect(await resultFolder(await runAnswer(listed, listedFiles))).toEqual(files);
  });

  test("Markdown tables have as many cells in every row", async () => {
    const markdown = markdownReport(await runAnswer(listed, listedFiles), "none");
    let width = 0;
    let tables = 0;
    for (const line of markdown.split("\n")) {
      if (!line.startsWith("|")) {
        width = 0;
        continue;
      }
      const cells = line.replace(/\\\|/g, "").split("|").length;
      if (width === 0) tables += 1;
      else expect(cells, line).toBe(width);
      width = cells;
    }
    expect(tables).toBeGreaterThan(8);
    expect(markdown).not.toContain("![");
  });

  test("a study without a cell or with an open letter has a report without drawings but the graph of subgroups", async () => {
    const study = "group: P n m a\nsites: [{label: Fe, at: [0, 0, 0]}]\nk: [[0, u, 0]]\n";
    const files = await resultFolder(await runAnswer(study));
    expect(files.map(({ name }) => name)).toContain("report.html");
    expect(files.map(({ name }) => name).filter((name) => name.endsWith(".svg"))).toEqual([
      "branch-1-configurations.svg",
    ]);
  });
});
