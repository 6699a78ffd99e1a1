import { describe, expect, test } from "vitest";
import { kvane, scratchFolder } from "./command.js";

/** 2θ in degrees of a line at d (Å) for λ (Å): Bragg's law, apart from the program's own. */
function twoTheta(d: number, wavelength: number): number {
  return (360 / Math.PI) * Math.asin(wavelength / (2 * d));
}

/**
 * MnO: the magnetic lines of C. G. Shull, W. A. Strauser & E. O. Wollan, Phys. Rev. 83 (1951) 333, index on a cell of
 * twice the chemical one. Positions computed here from a = 4.43 Å and λ = 1.057 Å, the published values.
 */
describe("MnO of 1951 through the command line", () => {
  const a = 4.43;
  const wavelength = 1.057;
  const sums = [3, 11, 19, 27, 35].map((sum) => sum / 4);
  const list = sums.map((sum) => `${twoTheta(a / Math.sqrt(sum), wavelength).toFixed(2)} 0.05\n`).join("");
  const folder = scratchFolder({ "mno.txt": list });
  const common = ["F m -3 m", "--cell", `${a} ${a} ${a} 90 90 90`];
  const peaks = ["--peaks", "mno.txt", "--as", "two-theta", "--wavelength", String(wavelength)];

  test("locate puts (1/2,1/2,1/2) first, with every line indexed", async () => {
    const { status, stdout } = await kvane(["locate", ...common, ...peaks, "--json"], { cwd: folder });
    expect(status).toBe(0);
    const [first] = JSON.parse(stdout).result.candidates;
    expect(first.k.components).toEqual(["1/2", "1/2", "1/2"]);
    expect([first.matched, first.total]).toEqual([sums.length, sums.length]);
    expect(first.arms).toBe(4);
  });

  test("the list of satellites has these lines, and their multiplicities over all arms", async () => {
    const words = ["satellites", ...common, "--k", "1/2,1/2,1/2", "--q-max", "4.3", "--wavelength", String(wavelength)];
    const { result } = JSON.parse((await kvane([...words, "--json"], { cwd: folder })).stdout);
    const found = new Map<string, number>();
    for (const { d, multiplicityAllArms } of result.reflections) {
      const sum = ((a / d) ** 2).toFixed(2);
      found.set(sum, (found.get(sum) ?? 0) + multiplicityAllArms);
    }
    // Vectors (h+½, k+½, l+½) with h, k, l unmixed or not, all odd halves: 8, 24, 24, 8 + 24, 48 for these sums.
    expect([...found]).toEqual([
      ["0.75", 8],
      ["2.75", 24],
      ["4.75", 24],
      ["6.75", 32],
      ["8.75", 48],
    ]);
  });
});
