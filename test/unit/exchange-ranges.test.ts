import type { Request } from "@kvane/core/job";
import {
  type ExchangeRecord,
  type RunRecord,
  reportCsv,
  reportSvg,
  reportText,
  resultFolder,
} from "@kvane/core/reports";
import { describe, expect, it } from "vitest";
import { askedWith } from "../support/asked.js";

/** Third neighbours of the kagome net are of two kinds: along a chain (3a) and across a hexagon (3b). */
const kagome: Request = {
  command: "exchange",
  group: "P 6/m m m",
  cell: "6 6 20 90 90 120",
  sites: ["M 1/2 0 0"],
};

const square = `group: P 4/m m m
cell: {a: 4, b: 4, c: 40, alpha: 90, beta: 90, gamma: 90}
sites: [{label: M, at: [0, 0, 0]}]
k: [[1/2, 1/2, 0]]
`;

async function exchange(request: Request, files: Readonly<Record<string, string>> = {}) {
  const envelope = await askedWith(request, files);
  expect(envelope.errors).toEqual([]);
  return { envelope, record: envelope.result as ExchangeRecord };
}

/** J of each kind of bonds as the model has them outside the diagram. */
function constants({ shells }: ExchangeRecord): Record<string, number | null> {
  return Object.fromEntries(shells.flatMap(({ classes }) => classes.map(({ name, j }) => [name, j])));
}

describe("a range of one kind of bonds", () => {
  it("leaves the rest of a shell that is given as a whole where it is, and says so", async () => {
    const { envelope, record } = await exchange({ ...kagome, constants: ["1 1", "3 0.3"], vary: ["3a 0 1 3"] });
    expect(constants(record)).toMatchObject({ "3a": 0.3, "3b": 0.3 });
    expect(record.diagram?.axes).toMatchObject([{ name: "3a", classes: ["3a"] }]);
    expect(envelope.assumed.find(({ what }) => what === "what runs as J3a")?.value).toBe("3a alone; 3b stays at 0.3");
    // The same points as with the two kinds named apart.
    const apart = await exchange({ ...kagome, constants: ["1 1", "3a 0.3", "3b 0.3"], vary: ["3a 0 1 3"] });
    expect(record.diagram?.points).toEqual(apart.record.diagram?.points);
  });

  it("runs as one with its shell where only a part has a constant", async () => {
    const { record } = await exchange({ ...kagome, constants: ["1 1", "3a 0.2"], vary: ["3 -1 1 2"] });
    expect(constants(record)).toMatchObject({ "3a": 0.2, "3b": -1 });
    expect(record.diagram?.axes[0]?.classes).toEqual(["3a", "3b"]);
  });

  it.each([
    [
      "two ranges of the same bonds",
      { vary: ["3 0 1 3", "3a 0 1 3"] },
      "conflicting-arguments",
      "3a run in two ranges",
    ],
    ["a range of no bonds", { vary: ["3c 0 1 3"] }, "invalid-argument", "no bonds 3c"],
    ["an endless range", { vary: ["3 0 1e400"] }, "invalid-argument", "no range"],
  ] as const)("refuses %s", async (_what, options, code, text) => {
    const { errors } = await askedWith({ ...kagome, constants: ["1 1"], ...options });
    expect(errors.map((one) => one.code)).toEqual([code]);
    expect(errors[0]?.message).toContain(text);
    expect(errors[0]?.where.argument).toBe("--vary");
  });

  it("tells how to name the kinds where shell and kind both have a constant", async () => {
    const { errors } = await askedWith({ ...kagome, constants: ["1 1", "3 0.3", "3b 1"] });
    expect(errors.map(({ code }) => code)).toEqual(["conflicting-arguments"]);
    expect(errors[0]?.remedy).toBe("instead of 3 name its kinds apart: 3a, 3b");
  });
});

describe("ranges in a study", () => {
  const study = `${square}exchange: [{shell: 1, j: 1}, {shell: 2, j: 0.1, vary: [0, 1, 5]}]\n`;

  it("draw the diagram that the options draw", async () => {
    const { envelope, record } = await exchange({ command: "exchange", study: "s.yaml" }, { "s.yaml": study });
    const options = await exchange({
      command: "exchange",
      group: "P 4/m m m",
      cell: "4 4 40 90 90 90",
      sites: ["M 0 0 0"],
      constants: ["1 1", "2 0.1"],
      vary: ["2 0 1 5"],
    });
    expect(record.diagram).toEqual(options.record.diagram);
    expect(record.ground?.energy).toBeCloseTo(-2 + 0.2, 9);
    expect(await reportSvg(envelope)).toBe(await reportSvg(options.envelope));
  });

  it("yield to --vary, and with all of the section to --j", async () => {
    const files = { "s.yaml": study };
    const varied = await exchange({ command: "exchange", study: "s.yaml", vary: ["1 0.5 1 2"] }, files);
    expect(varied.record.diagram?.axes.map(({ name }) => name)).toEqual(["1"]);
    const replaced = await exchange({ command: "exchange", study: "s.yaml", constants: ["1 1"] }, files);
    expect(replaced.record.diagram).toBeNull();
  });

  it("need no constant, and may be those between two sites", async () => {
    const two = square
      .replace("[{label: M, at: [0, 0, 0]}]", "[{label: A, at: [0, 0, 0]}, {label: B, at: [1/2, 1/2, 0]}]")
      .concat("exchange: [{shell: 1, j: 1}, {shell: 2, between: [A, A], vary: [0, 1, 2]}]\n");
    const { record } = await exchange({ command: "exchange", study: "s.yaml" }, { "s.yaml": two });
    expect(record.diagram?.axes).toMatchObject([{ name: "2a", classes: ["2a"], count: 2 }]);
    expect(constants(record)).toMatchObject({ "2a": 0, "2b": null });
  });

  it("are refused where they are too many, at their place", async () => {
    const three = `${square}exchange:\n  - {shell: 1, vary: [0, 1]}\n  - {shell: 2, vary: [0, 1]}\n  - {shell: 3, vary: [0, 1]}\n`;
    const { errors } = await askedWith({ command: "exchange", study: "s.yaml" }, { "s.yaml": three });
    expect(errors.map(({ code, where }) => [code, where.line])).toEqual([["invalid-argument", 8]]);
  });

  it("come out in the whole job: text, page, drawing", async () => {
    const envelope = await askedWith({ command: "run", study: "s.yaml", files: true }, { "s.yaml": study });
    const record = envelope.result as RunRecord;
    expect(record.exchange?.diagram?.points).toHaveLength(5);
    expect(await reportText(envelope)).toContain("Phase diagram (J2)");
    const files = new Map(
      (await resultFolder(envelope as Parameters<typeof resultFolder>[0])).map((one) => [one.name, one.text]),
    );
    expect(files.get("phase-diagram.svg")).toContain("<title>Phase diagram of the exchange model</title>");
    expect(files.get("report.html")).toContain("figure-phase-diagram");
  });
});

describe("a boundary at the end of a range", () => {
  it("is where the set of k shrinks, though its k stay among them", async () => {
    // Without J2 the layers of the chain do not know of each other: every k along c is as good.
    const { record } = await exchange({
      command: "exchange",
      group: "P 4/m m m",
      cell: "4 4 5 90 90 90",
      sites: ["M 0 0 0"],
      constants: ["1 -1"],
      vary: ["2 0 -1 5"],
    });
    expect(record.diagram?.boundaries?.map(({ value }) => value)).toEqual([0]);
    const other = await exchange({
      command: "exchange",
      group: "P 4/m m m",
      cell: "4 4 5 90 90 90",
      sites: ["M 0 0 0"],
      constants: ["1 -1"],
      vary: ["2 -1 0 5"],
    });
    expect(other.record.diagram?.boundaries?.map(({ value }) => value)).toEqual([0]);
  });
});

describe("the letters of a phase diagram", () => {
  it("go on without a gap, whatever the search for boundaries met", async () => {
    // Two sublattices along a chain: the ferrimagnet, then a spiral, and at J2 = 0 chains that do not know of each other.
    const { record } = await exchange({
      command: "exchange",
      group: "P 4/m m m",
      cell: "5.1 5.1 4 90 90 90",
      sites: ["A 0 0 0", "B 1/2 1/2 1/2"],
      constants: ["1 0.4"],
      vary: ["2 0 1.2 4"],
    });
    const { phases, points, boundaries } = record.diagram ?? { phases: [], points: [], boundaries: [] };
    const used = new Set([
      ...points.map(({ phase }) => phase),
      ...(boundaries ?? []).flatMap(({ from, to }) => [from, to]),
    ]);
    expect([...used].sort()).toEqual(phases.map((_, index) => index));
    // E = 2 J1 cos 2πu − 8 J2 cos πu a cell for equal spins: cos πu = J2/J1, and J2 alone decides beyond.
    expect(boundaries?.map(({ value }) => Number(value.toFixed(5)))).toEqual([0, 0.4]);
  }, 60_000);
});

describe("the table of kvane exchange", () => {
  const model: Request = {
    command: "exchange",
    group: "P 4/m m m",
    cell: "4 4 40 90 90 90",
    sites: ["M 0 0 0"],
    constants: ["1 1", "2 0.2"],
  };
  const rows = (csv: string | null) => (csv ?? "").trimEnd().split("\n");

  it("has the letters that the text has", async () => {
    const { envelope } = await exchange({ ...model, vary: ["2 0 1 5"] });
    const letters = rows(await reportCsv(envelope))
      .slice(1)
      .map((row) => row.split(",")[2]);
    expect(await reportText(envelope)).toContain(`J2 from 0 to 1: ${letters.join("")}`);
    expect(letters.join("")).toMatch(/^[A-Z]+$/);
  });

  it("has the energies where no constant runs, each of the arrangements with its own", async () => {
    const { envelope, record } = await exchange({ ...model, k: "1/2,1/2,0" });
    const [header, ...lines] = rows(await reportCsv(envelope));
    expect(header).toBe("what,k,k_numeric,id,irreps,direction,free_amplitudes,energy_lowest,energy_highest");
    const arranged = lines.filter((line) => line.startsWith("arrangement,"));
    expect(arranged).toHaveLength(record.configurations.length);
    // −2 J1 + 2 J2 for the antiferromagnet.
    for (const line of lines.filter((one) => one.includes("0.5 0.5 0"))) expect(line).toMatch(/,-1\.6,-1\.6$/);
    expect(lines.some((line) => line.startsWith("eigenvalue at the given k,"))).toBe(true);
  });

  it("has the bonds where there is no constant", async () => {
    const { envelope } = await exchange({ ...model, constants: null });
    expect(rows(await reportCsv(envelope))[0]).toContain("length_angstrom");
  });
});

describe("kvane check", () => {
  const checked = async (section: string) => {
    const { errors } = await askedWith({ command: "check", study: "s.yaml" }, { "s.yaml": `${square}${section}\n` });
    return errors.map(({ code, where }) => `${code} ${where.line}`);
  };

  it("holds bonds and ranges of a study against its structure, without computing anything", async () => {
    expect(await checked("exchange: [{shell: 1, j: 1}, {shell: 2, vary: [0, 1]}]")).toEqual([]);
    expect(
      await checked(
        "exchange:\n  - {bond: 1b, j: 1}\n  - {shell: 2, between: [M, N], j: 1}\n  - {bond: 3c, vary: [0, 1]}",
      ),
    ).toEqual(["invalid-argument 6", "invalid-argument 7", "invalid-argument 8"]);
  });

  it("misses the cell that constants need", async () => {
    const text = `${square.replace(/cell.*\n/, "")}exchange: [{shell: 1, j: 1}]\n`;
    const { errors } = await askedWith({ command: "check", study: "s.yaml" }, { "s.yaml": text });
    expect(errors.map(({ code, where }) => `${code} ${where.path}`)).toEqual(["missing-key exchange"]);
  });
});
