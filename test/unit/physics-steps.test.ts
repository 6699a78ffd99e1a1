import type { RunRecord } from "@kvane/core/reports";
import { describe, expect, it } from "vitest";
import { askedWith } from "../support/asked.js";

const study = (k: string, more: string) => `group: P 4/m m m
cell: {a: 8, b: 8, c: 3, alpha: 90, beta: 90, gamma: 90}
sites: [{label: M, at: [0, 0, 0]}]
k: [[${k}]]
${more}
`;

async function next(text: string, files: Readonly<Record<string, string>> = {}) {
  const { errors, result } = await askedWith({ command: "run", study: "s.yaml" }, { "s.yaml": text, ...files });
  expect(errors).toEqual([]);
  return (result as RunRecord).next.join("\n");
}

// A chain with J2 = J1/2: cos 2πk = −1/2.
const chain = "exchange: [{shell: 1, j: 1}, {shell: 2, j: 0.5}]";

describe("what to do next", () => {
  it("mentions constants that prefer another k, by how much, and what helps", async () => {
    const text = await next(study("0, 0, 0.29", chain));
    expect(text).toContain("The exchange constants prefer k = (0, 0, 0.3333)");
    // 2 J1 cos q + 2 J2 cos 2q, halved, less the minimum −0.75.
    const q = 2 * Math.PI * 0.29;
    const above = Math.cos(q) + 0.5 * Math.cos(2 * q) + 0.75;
    expect(text).toContain(`k = (0, 0, 0.29) lies ${Number(above.toPrecision(4))} a spin higher`);
    expect(text).toContain("kvane exchange with --k");
    expect(await next(study("0, 0, 1/2", chain))).toContain("(0, 0, 1/2) lies 0.25 a spin higher");
  });

  it("is silent where they agree: exactly, or within what a measured value may be off", async () => {
    for (const k of ["0, 0, 1/3", "0, 0, 0.3325"]) expect(await next(study(k, chain))).not.toContain("prefer");
    expect(await next(study("0, 0, 1/2", "exchange: [{shell: 1, j: 1}]"))).not.toContain("prefer");
  });

  it("mentions where k locks in, with the fraction", async () => {
    const rows = [0.25, 0.25, 0.25, 0.25, 0.25, 0.26, 0.27, 0.28, 0.29].map((u, n) => `${4 + 2 * n} ${u} 0.0005`);
    const text = await next(study("0, 0, 1/4", "onset: {file: k.txt}"), { "k.txt": `T u su\n${rows.join("\n")}\n` });
    expect(text).toMatch(/u locks in at 1\/4 from 4 to 1[02] K and slides elsewhere/);
    const level = rows.map((row) => row.replace(/ 0\.\d+ /, " 0.25 "));
    const silent = await next(study("0, 0, 1/4", "onset: {file: k.txt}"), { "k.txt": `T u su\n${level.join("\n")}\n` });
    expect(silent).not.toContain("locks in");
  });
});

describe("exchange constants without a cell", () => {
  it("are refused at their place, before the work", async () => {
    const text = study("0, 0, 1/2", chain).replace(/cell.*\n/, "");
    const { errors } = await askedWith({ command: "run", study: "s.yaml" }, { "s.yaml": text });
    expect(errors).toHaveLength(1);
    expect(errors[0]).toMatchObject({ code: "missing-key", where: { file: "s.yaml", line: 4, path: "exchange" } });
    expect(errors[0]?.remedy).toContain("add the cell");
  });
});
