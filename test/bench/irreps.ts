/**
 * The cost of small irreps: all kinds of k of all 230 groups, per irrep by the order of the little co-group, and beside
 * the irreps that GAP (a general-purpose computer-algebra system) makes of the same little groups where it is installed.
 * Times are of one process's processor; ratios are what to keep.
 * `node test/tools/run-typescript.mjs test/bench/irreps.ts`
 */
import { spawnSync } from "node:child_process";
import { smallIrreps } from "@kvane/core/irreps";
import { atlas, exactWaveVector, littleGroup, type WaveVector } from "@kvane/core/kvectors";
import { groupFromSetting, parseGroup, type SpaceGroup, tabulatedSettings } from "@kvane/core/spacegroups";
import { parseRational, type Rational } from "#core/numbers/index.js";

function processorSeconds(work: () => void): number {
  const start = process.cpuUsage();
  work();
  const { user, system } = process.cpuUsage(start);
  return (user + system) / 1e6;
}

const byOrder = new Map<number, { irreps: number; seconds: number }>();
let kinds = 0;
let total = 0;
const sweep = processorSeconds(() => {
  for (const setting of tabulatedSettings().filter(({ standard }) => standard)) {
    const group = groupFromSetting(setting);
    for (const { k, littleCoGroup } of atlas(group, { withInversion: false })) {
      let found = 0;
      const seconds = processorSeconds(() => {
        found = smallIrreps(group, k).irreps.length;
      });
      const row = byOrder.get(littleCoGroup.order) ?? { irreps: 0, seconds: 0 };
      byOrder.set(littleCoGroup.order, { irreps: row.irreps + found, seconds: row.seconds + seconds });
      kinds += 1;
      total += found;
    }
  }
});
console.log(
  `\nSmall irreps at every kind of k of the 230 groups: ${kinds} kinds, ${total} irreps, ${sweep.toFixed(1)} s`,
);
const least = Math.min(...[...byOrder.values()].map(({ irreps, seconds }) => seconds / irreps));
console.log("order of the little co-group   irreps   cost per irrep over the cheapest");
for (const [order, { irreps, seconds }] of [...byOrder].sort(([a], [b]) => a - b))
  console.log(
    `${String(order).padStart(28)}${String(irreps).padStart(9)}${(seconds / irreps / least).toFixed(1).padStart(35)}`,
  );

/** Little groups modulo the translations on which all multiples of k are trivial: what GAP takes as a finite group. */
const compared = [
  ["P n m a", "0,1/2,0"],
  ["P 63/m m c", "1/3,1/3,1/2"],
  ["P 21 3", "1/2,1/2,1/2"],
  ["F d -3 m:2", "0,0,1"],
  ["P n -3 n:2", "1/2,1/2,1/2"],
] as const;

/** Affine integer matrices modulo `modulus`, in the primitive basis. */
function affineGenerators(
  group: SpaceGroup,
  k: WaveVector,
  order: number,
): { matrices: number[][][]; modulus: number } {
  const { rotations, translations, denominator } = group.primitive;
  const affine = (rotation: readonly number[], t: readonly number[]): number[][] => [
    ...[0, 1, 2].map((row) => [...rotation.slice(3 * row, 3 * row + 3), t[row] as number]),
    [0, 0, 0, 1],
  ];
  const unit = [1, 0, 0, 0, 1, 0, 0, 0, 1];
  const lattice = [0, 1, 2].map((axis) =>
    affine(
      unit,
      [0, 1, 2].map((other) => (other === axis ? denominator : 0)),
    ),
  );
  const little = littleGroup(group, k).operators.map((index) =>
    affine(rotations[index] as readonly number[], translations[index] as readonly number[]),
  );
  return { matrices: [...little, ...lattice], modulus: order * denominator };
}

function gapSeconds(group: SpaceGroup, k: WaveVector, order: number): { seconds: number; irreps: number } | null {
  const { matrices, modulus } = affineGenerators(group, k, order);
  const program = `m:=${modulus};; o:=One(ZmodnZ(m));;
G:=Group(List(${JSON.stringify(matrices)},x->x*o));; H:=Image(IsomorphismPcGroup(G));; Size(H);;
t:=Runtime();; n:=Length(IrreducibleRepresentations(H));; Print(Runtime()-t," ",n,"\\n"); QUIT;\n`;
  const run = spawnSync("gap", ["-q", "-b"], { input: program, encoding: "utf8", timeout: 300_000 });
  const [milliseconds, irreps] = (run.stdout ?? "").trim().split(" ").map(Number);
  return milliseconds === undefined || irreps === undefined || Number.isNaN(irreps)
    ? null
    : { seconds: milliseconds / 1000, irreps };
}

if (spawnSync("gap", ["--version"]).error) console.log("\nGAP is not installed: no comparison with it.");
else {
  console.log("\nAgainst GAP, processor time (its finite group also has the irreps of the multiples of k):");
  for (const [symbol, text] of compared) {
    const group = parseGroup(symbol);
    const components = text.split(",").map((part) => parseRational(part) as Rational) as [Rational, Rational, Rational];
    const k = exactWaveVector(components);
    const order = components.reduce((common, [, denominator]) => Math.max(common, denominator), 2) === 3 ? 6 : 2;
    const rounds = 20;
    let irreps = 0;
    const own = processorSeconds(() => {
      for (let round = 0; round < rounds; round++) irreps = smallIrreps(group, k).irreps.length;
    });
    const gap = gapSeconds(group, k, order);
    const said =
      gap === null
        ? "no answer"
        : `${(gap.seconds / gap.irreps / (own / rounds / irreps)).toFixed(1)} per irrep, ${(gap.seconds / (own / rounds)).toFixed(0)} for the whole question (${gap.irreps} and ${irreps} irreps)`;
    console.log(`  ${symbol.padEnd(12)} ${text.padEnd(12)} GAP / kvane ${said}`);
  }
}
