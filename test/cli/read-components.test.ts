import { describe, expect, test } from "vitest";
import { kvane, scratchFolder } from "./command.js";
import { schemaErrors } from "./schemas.js";

async function resultOf(...words: string[]) {
  return JSON.parse((await kvane([...words, "--json"])).stdout).result;
}

describe("kvane modes --read", () => {
  const cell = "10.21 6.05 4.71 90 90 90";
  const site = ["modes", "P n m a", "--k", "0,0.3,0", "--site", "A 0.1 0.2 0.3", "--cell", cell];
  const conventions = [
    [],
    ["--exponent", "plus"],
    ["--phase", "position"],
    ["--factor", "half"],
    ["--components", "crystal"],
    ["--components", "cartesian", "--exponent", "plus", "--phase", "position", "--factor", "half"],
  ];

  test.each(conventions.map((words) => [words.join(" ") || "own convention", words] as const))(
    "a basis vector that was written in a convention is read back: %s",
    async (_name, words) => {
      const { sites } = await resultOf(...site, ...words);
      const plain = (await resultOf(...site)).sites[0];
      const irrep = sites[0].irreps.findIndex(({ multiplicity }: { multiplicity: number }) => multiplicity > 1);
      const chosen = sites[0].irreps[irrep].modes[1];
      const number = ([re, im]: [number, number]) => `${re}${im < 0 ? "" : "+"}${im}i`;
      const rows = chosen.moments.map((vector: [number, number][], atom: number) =>
        [atom + 1, ...vector.map(number)].join("  "),
      );
      const folder = scratchFolder({ "list.txt": `# from a table\n${rows.join("\n")}\n` });
      const { status, stdout } = await kvane([...site, ...words, "--read", "list.txt", "--json"], { cwd: folder });
      expect(status).toBe(0);
      const answer = JSON.parse(stdout);
      expect(schemaErrors("modes", answer)).toEqual([]);
      const { read } = answer.result.sites[0];
      read.irreps.forEach(({ share, amplitudes }: ReadIrrep, index: number) => {
        expect(share).toBeCloseTo(index === irrep ? 1 : 0, 8);
        for (const [at, { value }] of amplitudes.entries()) {
          const [re, im] = value;
          if (index !== irrep || at !== 1) expect(Math.hypot(re, im)).toBeLessThan(1e-8);
        }
      });
      // Crystal and Cartesian vectors are divided by the length of the axis of their leading entry, b here.
      const unit = words.includes("--components") ? 6.05 : 1;
      const [re = 0, im = 0] = read.irreps[irrep].amplitudes[1].value;
      expect(re).toBeCloseTo(1 / unit, 8);
      expect(im).toBeCloseTo(0, 8);
      const own = plain.irreps[irrep].modes[1].moments;
      expect(read.components).toEqual(
        own.map((vector: [number, number][]) =>
          vector.map((entry) => entry.map((value) => expect.closeTo(value / unit, 8))),
        ),
      );
    },
  );

  test("any components split into shares that add up to 1, and the parts make them up again", async () => {
    const list = "1 0.5+0.1i 0 -0.3\n2; i; -1e-1i; .25\n4\t0\t1\t0 ! the others have none\n";
    const folder = scratchFolder({ "list.txt": list });
    const hexagonal = ["modes", "P 63/m m c", "--k", "1/3,1/3,0.2", "--site", "A 1/3 2/3 0.1", "--read", "list.txt"];
    const { stdout } = await kvane([...hexagonal, "--json"], { cwd: folder });
    const [{ read, irreps }] = JSON.parse(stdout).result.sites;
    const total = read.irreps.reduce((sum: number, { share }: ReadIrrep) => sum + share, 0);
    expect(total).toBeCloseTo(1, 8);
    const rebuilt = read.components.map((vector: unknown[]) => vector.map(() => [0, 0]));
    read.irreps.forEach(({ amplitudes }: ReadIrrep, index: number) => {
      for (const [at, { value }] of amplitudes.entries()) {
        const [a, b] = value;
        irreps[index].modes[at].moments.forEach((vector: [number, number][], atom: number) => {
          for (const [axis, [x, y]] of vector.entries()) {
            rebuilt[atom][axis][0] += a * x - b * y;
            rebuilt[atom][axis][1] += a * y + b * x;
          }
        });
      }
    });
    const given = [
      [
        [0.5, 0.1],
        [0, 0],
        [-0.3, 0],
      ],
      [
        [0, 1],
        [0, -0.1],
        [0.25, 0],
      ],
      [
        [0, 0],
        [0, 0],
        [0, 0],
      ],
      [
        [0, 0],
        [1, 0],
        [0, 0],
      ],
    ];
    const close = given.map((vector) => vector.map((entry) => entry.map((value) => expect.closeTo(value, 8))));
    expect(read.components).toEqual(close);
    expect(rebuilt).toEqual(close);
    const text = (await kvane(hexagonal, { cwd: folder })).stdout;
    expect(text).toContain("Fourier components of A from list.txt");
    expect(text).toContain("Their parts by irrep");
  });
});

interface ReadIrrep {
  readonly share: number;
  readonly amplitudes: readonly { readonly value: readonly [number, number] }[];
}
