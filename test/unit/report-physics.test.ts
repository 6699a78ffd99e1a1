import { readFileSync } from "node:fs";
import { answer, type Request } from "@kvane/core/job";
import { type ExchangeRecord, type OnsetRecord, type RunRecord, reportSvg, resultFolder } from "@kvane/core/reports";
import { describe, expect, it } from "vitest";
import { wellFormed } from "../support/well-formed.js";
import { root } from "../tools/paths.mjs";

const scan = readFileSync(`${root}/packages/cli/example/scan.csv`, "utf8");
const slide = "T u su\n4 0.25 0.001\n6 0.25 0.001\n8 0.25 0.001\n10 0.26 0.001\n12 0.27 0.001\n14 0.28 0.001\n";

const study = `title: Chain (invented)
group: P 4/m m m
cell: {a: 8, b: 8, c: 3, alpha: 90, beta: 90, gamma: 90}
sites: [{label: M, at: [0, 0, 0]}]
k: [[0, 0, 1/2]]
exchange: [{shell: 1, j: 1.0}, {shell: 2, j: 0.5}]
onset: {file: scan.csv}
`;

function asked(request: Request, files: Readonly<Record<string, string>> = { "scan.csv": scan, "slide.csv": slide }) {
  return answer(request, {
    readText: (path) => {
      const text = files[path];
      return text === undefined ? Promise.reject(new Error(`no ${path}`)) : Promise.resolve(text);
    },
  });
}

function count(text: string, pattern: RegExp): number {
  return [...text.matchAll(pattern)].length;
}

const square = { command: "exchange", group: "P 4/m m m", cell: "4 4 10 90 90 90", sites: ["M 0 0 0"] };

describe("the drawing of a phase diagram", () => {
  it("has a point, a cell and a letter for each value of one constant, and a line for each boundary", async () => {
    const envelope = await asked({ ...square, constants: ["1 1"], vary: ["2 0 1 11"] });
    const { diagram } = envelope.result as ExchangeRecord;
    const svg = (await reportSvg(envelope)) ?? "";
    expect(wellFormed(svg)).toBe(true);
    expect(svg).toContain("<title>Phase diagram of the exchange model</title>");
    expect(svg).toContain("11 points");
    expect(count(svg, /<circle [^>]*data-phase/g)).toBe(11);
    const drawn = diagram?.phases.filter((_, n) => diagram.points.some(({ phase }) => phase === n)).length ?? 0;
    expect(count(svg, /<rect [^>]*data-phase/g)).toBeGreaterThanOrEqual(11 + drawn);
    // Collinear order along one axis from J2 = J1/2 on.
    expect(diagram?.boundaries?.length).toBeGreaterThan(0);
    expect(count(svg, /<path d="M[\d.]+ 26V238"/g)).toBe(diagram?.boundaries?.length);
    expect(await reportSvg(envelope)).toBe(svg);
  });

  it("has a cell of the right phase for each point of a map", async () => {
    const envelope = await asked({ ...square, constants: ["1 1"], vary: ["1 -1 1 3", "2 0.1 1 2"] });
    const { diagram } = envelope.result as ExchangeRecord;
    const svg = (await reportSvg(envelope)) ?? "";
    expect(wellFormed(svg)).toBe(true);
    const phases = [...svg.matchAll(/<rect [^>]*data-phase="(\d+)"/g)].map(([, phase]) => Number(phase));
    expect(phases.slice(0, 6)).toEqual(diagram?.points.map(({ phase }) => phase));
    for (const name of ["J1", "J2"]) expect(svg).toContain(`>${name}</text>`);
  });

  it("is not made where no constant runs", async () => {
    expect(await reportSvg(await asked({ ...square, constants: ["1 1"] }))).toBeNull();
  });
});

describe("the drawing of a temperature scan", () => {
  it.each(["scan.csv", "slide.csv"])("has every point of every column of %s, and the fitted laws", async (name) => {
    const envelope = await asked({ command: "onset", scan: name });
    const { peaks, k } = envelope.result as OnsetRecord;
    const svg = (await reportSvg(envelope)) ?? "";
    expect(wellFormed(svg)).toBe(true);
    expect(svg).not.toContain("NaN");
    const points = [...peaks, ...k].reduce((sum, { data }) => sum + data.values.length, 0);
    expect(points).toBeGreaterThan(0);
    expect(count(svg, /<circle /g)).toBe(points);
    const fitted = peaks.filter(({ fit }) => fit !== null).length;
    expect(count(svg, /stroke-width="1.8"/g)).toBe(fitted);
    expect(count(svg, /T_N = /g)).toBe(fitted);
    expect(await reportSvg(envelope)).toBe(svg);
  });
});

describe("the whole job", () => {
  it("has the records of both commands, with the k of the study", async () => {
    const files = { "study.yaml": study, "scan.csv": scan };
    const run = await asked({ command: "run", study: "study.yaml", files: true }, files);
    expect(run.errors).toEqual([]);
    const record = run.result as RunRecord;
    const alone = await asked({ command: "exchange", study: "study.yaml" }, files);
    expect(record.exchange).toEqual(alone.result);
    expect(record.onset).toEqual((await asked({ command: "onset", study: "study.yaml" }, files)).result);
    const folder = new Map((await resultFolder(run as never)).map(({ name, text }) => [name, text]));
    expect(record.files).toEqual([...folder.keys()]);
    expect(wellFormed(folder.get("onset.svg") ?? "")).toBe(true);
    for (const name of ["report.html", "report.md", "report.txt"]) {
      expect(folder.get(name), name).toContain("Exchange model");
      expect(folder.get(name), name).toContain("Transitions");
    }
    expect(folder.get("report.md")).toContain("(onset.svg)");
  });

  it("says where a section is wrong", async () => {
    const files = { "study.yaml": study.replace("scan.csv", "none.csv"), "scan.csv": scan };
    const { errors } = await asked({ command: "run", study: "study.yaml" }, files);
    expect(errors.map(({ where }) => where.file)).toEqual(["study.yaml"]);
    expect(errors[0]?.where.line).toBe(7);
    const wrong = { "study.yaml": study.replace("shell: 2, j: 0.5", "bond: 2b, j: 0.5"), "scan.csv": scan };
    const other = await asked({ command: "run", study: "study.yaml" }, wrong);
    expect(other.errors[0]?.where).toMatchObject({ file: "study.yaml", line: 6 });
  });

  it("has neither where the study has neither", async () => {
    const bare = study.split("\n").slice(0, 5).join("\n");
    const { result } = await asked({ command: "run", study: "study.yaml" }, { "study.yaml": `${bare}\n` });
    expect(result).toMatchObject({ exchange: null, onset: null });
  });
});
