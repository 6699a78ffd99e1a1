import { parseScanTable } from "@kvane/core/files";
import { likeUncertainties } from "@kvane/core/onsets";
import { type OnsetRecord, reportText } from "@kvane/core/reports";
import { describe, expect, it } from "vitest";
import { askedWith } from "../support/asked.js";
import { problemsOf } from "../support/problems-of.js";
import { seeded } from "../support/random.js";
import { normal } from "../support/scans.js";

const row = (width: number) => Array.from({ length: width }, (_, n) => String(n + 1)).join(" ");

/** Each column with what it belongs to: `I1`, `s1>I1`. */
function read(header: string): string {
  const { columns } = parseScanTable(`${header}\n${row(header.split(" ").length)}\n`, "scan");
  return columns.map(({ name, of }) => (of === null ? name : `${name}>${columns[of]?.name}`)).join(" ");
}

describe("columns of uncertainties", () => {
  it.each([
    ["T I1 su I2 su", "T I1 su>I1 I2 su>I2"],
    ["T I1 err I2 sigma", "T I1 err>I1 I2 sigma>I2"],
    ["T I1 s1 I2 s2", "T I1 s1>I1 I2 s2>I2"],
    ["T I1 I2 s1 s2", "T I1 I2 s1>I1 s2>I2"],
    ["T I1 I2 su_I2 su_I1", "T I1 I2 su_I2>I2 su_I1>I1"],
    ["T I1 I1_err I2 I2err", "T I1 I1_err>I1 I2 I2err>I2"],
    ["T a b err(a) σ(b)", "T a b err(a)>a σ(b)>b"],
    ["T I dI", "T I dI>I"],
    ["T dT I e", "T dT>T I e>I"],
    ["T u su kz skz", "T u su>u kz skz>kz"],
    // Names of peaks that only begin so.
    ["T s1 s2 s3", "T s1 s2 s3"],
    ["T strong weak", "T strong weak"],
    ["T d1 e2", "T d1 e2"],
  ])("%s", (header, expected) => {
    expect(read(header)).toBe(expected);
  });

  it("are refused where they would be second ones", async () => {
    const [one] = await problemsOf(() => parseScanTable("T I1 I2 su su\n1 2 3 4 5\n", "scan"));
    expect(one).toMatchObject({ code: "invalid-scan", where: { line: 1, column: 12 } });
    expect(one?.remedy).toContain("su_I1 su_I2");
  });

  it("told by likeness are listed, and every column stands in text and JSON", async () => {
    const file = `T I1 s1\n${Array.from({ length: 10 }, (_, n) => `${n + 2} ${100 - n} 2`).join("\n")}\n`;
    const envelope = await askedWith({ command: "onset", scan: "a.txt" }, { "a.txt": file });
    const record = envelope.result as OnsetRecord;
    expect(record.peaks.map(({ name }) => name)).toEqual(["I1"]);
    expect(record.columns).toEqual([
      { name: "T", as: "temperature", of: null },
      { name: "I1", as: "intensity", of: null },
      { name: "s1", as: "uncertainty", of: "I1" },
    ]);
    expect(await reportText(envelope)).toContain("T; I1 with s.u. s1");
    expect(envelope.assumed.find(({ what }) => what === "column s1 of the scan")?.value).toBe("uncertainties of I1");
  });
});

describe("a peak that may be uncertainties", () => {
  const temperatures = Array.from({ length: 40 }, (_, n) => 2 + n);
  const law = (t: number) => 8 + (t < 30 ? 150 * (1 - t / 30) ** 0.6 : 0);

  it("is warned about where nothing in its name says so", async () => {
    const rows = temperatures.map((t) => `${t} ${law(t).toFixed(2)} 2.5`);
    for (const [header, name] of [
      ["T first second\n", "second"],
      ["", "column 3"],
    ] as const) {
      const { warnings, result } = await askedWith(
        { command: "onset", scan: "a.txt" },
        { "a.txt": `${header}${rows.join("\n")}\n` },
      );
      expect((result as OnsetRecord).peaks).toHaveLength(2);
      expect(warnings.map(({ code }) => code)).toEqual(["doubtful-column"]);
      expect(warnings[0]?.message).toContain(`${name} was fitted as a peak, but it may be the uncertainties of`);
      expect(warnings[0]?.remedy).toContain("su");
    }
  });

  const random = seeded(6);
  const peak = (scale: number) => ({
    name: "",
    temperatures,
    values: temperatures.map((t) => scale * law(t) + Math.sqrt(scale * law(t)) * normal(random)),
    uncertainties: null,
  });
  const scale = () => 10 ** (2 * random.next());

  it("is told from numbers alone where they are counting errors", () => {
    const taken = Array.from({ length: 200 }, () => {
      const counts = peak(scale());
      return likeUncertainties({ ...counts, values: counts.values.map((one) => Math.sqrt(Math.max(1, one))) }, counts);
    });
    expect(taken.filter((one) => one).length).toBeGreaterThan(140);
  });

  it("seldom is one that is a peak", () => {
    const taken = Array.from({ length: 200 }, () => likeUncertainties(peak(scale()), peak(scale())));
    expect(taken.filter((one) => one).length).toBeLessThan(12);
  });
});
