import { readFileSync } from "node:fs";
import { answer, type Request } from "@kvane/core/job";
import { type ExchangeRecord, type OnsetRecord, reportCsv, reportText } from "@kvane/core/reports";
import { describe, expect, it } from "vitest";
import { root } from "../tools/paths.mjs";

const study = `title: Chain (invented)
group: P 4/m m m
cell: {a: 8, b: 8, c: 3, alpha: 90, beta: 90, gamma: 90}
sites: [{label: M, ion: Cu2+, at: [0, 0, 0], spin: 1/2}]
exchange: [{shell: 1, j: 1.0}, {shell: 2, j: 0.5}]
onset: {file: scan.csv}
`;

function asked(request: Request, files: Readonly<Record<string, string>> = { "study.yaml": study }) {
  return answer(request, {
    readText: (path) => {
      const text = files[path];
      return text === undefined ? Promise.reject(new Error(`no ${path}`)) : Promise.resolve(text);
    },
  });
}

const square: Request = {
  command: "exchange",
  group: "P 4/m m m",
  cell: "4 4 10 90 90 90",
  sites: ["M 0 0 0"],
};

describe("kvane exchange", () => {
  it("lists shells while no constants are given", async () => {
    const { result, errors } = await asked(square);
    expect(errors).toEqual([]);
    const record = result as ExchangeRecord;
    expect(record.ground).toBeNull();
    expect(record.shells.map(({ classes }) => classes[0]?.neighbours[0]?.count)).toEqual([4, 4, 4, 8, 2, 8]);
  });

  it("takes constants and the length of spins from a study", async () => {
    const envelope = await asked({ command: "exchange", study: "study.yaml" });
    const record = envelope.result as ExchangeRecord;
    // S² = 1/4 times −J1²/8J2 − J2.
    expect(record.ground?.energy).toBeCloseTo(-0.75 / 4, 9);
    expect(record.ground?.vectors[0]?.k.components).toEqual(["0", "0", "u"]);
    expect(record.ground?.vectors[0]?.k.values["u"]).toBeCloseTo(1 / 3, 6);
    expect(envelope.assumed.some(({ what }) => what === "lengths of the spins")).toBe(true);
    expect(await reportText(envelope)).toContain("coplanar arrangement of full spins");
  });

  it("says what a measured k asks of the constants", async () => {
    const { result } = await asked({ command: "exchange", study: "study.yaml", k: "0,0,0.29" });
    const stationary = (result as ExchangeRecord).stationary;
    expect(stationary?.relations[0]?.text).toBe("J1 + 4 cos(2πu) J2 = 0");
    expect(stationary?.fixedBySymmetry).toBe(true);
    // cos 2πu = −J1/4J2.
    const needed = stationary?.needed.find(({ name }) => name === "2");
    expect(needed?.j).toBeCloseTo(-1 / (4 * Math.cos(2 * Math.PI * 0.29)), 8);
    expect(needed).toMatchObject({ along: "minimum", lowest: true, oneOfMany: false });
    // The slope is that of λ = S² (2 J1 cos 2πu + 2 J2 cos 4πu).
    const u = 2 * Math.PI * 0.29;
    expect(stationary?.slopes[0]).toBeCloseTo(-Math.PI * (Math.sin(u) + 2 * 0.5 * Math.sin(2 * u)), 8);
    const [first, second] = stationary?.relations[0]?.curvatures ?? [];
    expect(first).toBeCloseTo(-2 * Math.PI ** 2 * Math.cos(u), 4);
    expect(second).toBeCloseTo(-8 * Math.PI ** 2 * Math.cos(2 * u), 4);
  });

  it("does so along a diagonal with three constants", async () => {
    const { result } = await asked({ ...square, constants: ["1 1", "2 0.2", "3 0.2"], k: "0.41,0.41,0" });
    const record = result as ExchangeRecord;
    // E = 2 J1 cos q + 2 J2 cos² q + 2 J3 cos 2q: J1 + (2 J2 + 4 J3) cos q = 0.
    expect(record.stationary?.relations[0]?.text).toBe("J1 + 2 cos(2πu) J2 + 4 cos(2πu) J3 = 0");
    const cosine = Math.cos(2 * Math.PI * 0.41);
    const j3 = record.stationary?.needed.find(({ name }) => name === "3")?.j ?? 0;
    expect(1 + (2 * 0.2 + 4 * j3) * cosine).toBeCloseTo(0, 8);
  });

  it("draws a phase diagram in text and CSV", async () => {
    const envelope = await asked({ ...square, constants: ["1 1"], vary: ["2 0 1 5"] });
    const { diagram } = envelope.result as ExchangeRecord;
    expect(diagram?.boundaries?.map(({ value }) => Number(value.toFixed(6)))).toEqual([0.5]);
    expect(await reportText(envelope)).toContain("Phase diagram (J2)");
    expect((await reportCsv(envelope))?.split("\n")).toHaveLength(7);
    const map = await asked({ ...square, constants: ["1 1"], vary: ["2 0 1 3", "3 0 0.6 3"] });
    expect((map.result as ExchangeRecord).diagram?.points).toHaveLength(9);
    expect(await reportText(map)).toContain("J3 upwards");
  });

  it("gives the energies of the arrangements of a k", async () => {
    const { result } = await asked({ ...square, constants: ["1 1", "2 0.6"], k: "1/2,1/2,0" });
    const record = result as ExchangeRecord;
    // −2 J1 + 2 J2 a spin for every direction of the moments.
    expect(record.configurations.length).toBeGreaterThan(1);
    for (const { lowest, highest } of record.configurations) {
      expect(lowest).toBeCloseTo(-0.8, 9);
      expect(highest).toBeCloseTo(-0.8, 9);
    }
    expect(record.atK.find(({ from }) => from === "given")?.above).toBeCloseTo(0.4, 9);
  });

  it.each([
    ["no constant", { constants: ["1"] }, "invalid-argument"],
    ["a bond that is not there", { constants: ["1 1", "2c 0.3"] }, "invalid-argument"],
    ["a constant twice", { constants: ["1 1", "1 2"] }, "conflicting-arguments"],
    ["a range without an end", { constants: ["1 1"], vary: ["2 0"] }, "invalid-argument"],
    ["three ranges", { constants: ["1 1"], vary: ["2 0 1 3", "3 0 1 3", "4 0 1 3"] }, "invalid-argument"],
    ["half a shell", { shells: "0.5" }, "invalid-number"],
  ] as const)("refuses %s", async (_what, options, code) => {
    const { result, errors } = await asked({ ...square, ...options });
    expect(result).toBeNull();
    expect(errors.map((one) => one.code)).toEqual([code]);
  });
});

describe("kvane onset", () => {
  const scan = readFileSync(`${root}/packages/cli/example/scan.csv`, "utf8");

  it("reads the bundled scan: two transitions and a nuclear peak", async () => {
    const envelope = await asked({ command: "onset", study: "study.yaml" }, { "study.yaml": study, "scan.csv": scan });
    expect(envelope.errors).toEqual([]);
    const record = envelope.result as OnsetRecord;
    // The scan was computed with onsets at 38.6, 38.6 and 33.2 K.
    expect(record.transitions.map(({ peaks }) => peaks)).toEqual([[2], [0, 1]]);
    for (const [index, truth] of [33.2, 38.6].entries()) {
      const { value, su } = record.transitions[index]?.temperature ?? { value: 0, su: 0 };
      expect(Math.abs(value - truth)).toBeLessThan(3 * (su ?? 0));
    }
    expect(record.peaks.map(({ behaviour }) => behaviour)).toEqual(["onset", "onset", "onset", "constant"]);
    expect(await reportText(envelope)).toContain("Transitions (2)");
    expect((await reportCsv(envelope))?.split("\n")).toHaveLength(6);
  });

  it("needs a scan", async () => {
    expect((await asked({ command: "onset" })).errors.map(({ code }) => code)).toEqual(["missing-argument"]);
    const without = study.replace(/onset.*\n/, "");
    const { errors } = await asked({ command: "onset", study: "study.yaml" }, { "study.yaml": without });
    expect(errors.map(({ code }) => code)).toEqual(["missing-key"]);
  });
});
