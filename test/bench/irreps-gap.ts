import { spawnSync } from "node:child_process";
import { smallIrreps } from "@kvane/core/irreps";
import { exactWaveVector, littleGroup, type WaveVector } from "@kvane/core/kvectors";
import { parseGroup, type SpaceGroup } from "@kvane/core/spacegroups";
import { parseRational, type Rational } from "#core/numbers/index.js";
import { processorTime } from "./clocks.js";
import type { Part, Row } from "./part.js";

/** Little groups modulo the translations on which all multiples of k are trivial: what GAP takes as a finite group. */
const compared = [
  ["P n m a", "0,1/2,0"],
  ["P 63/m m c", "1/3,1/3,1/2"],
  ["P 21 3", "1/2,1/2,1/2"],
  ["F d -3 m:2", "0,0,1"],
  ["P n -3 n:2", "1/2,1/2,1/2"],
] as const;

const rounds = 20;

/** GAP, a general-purpose computer-algebra system, on the same little groups, where it is installed. */
export const irrepsGap: Part = {
  name: "irreps-gap",
  measure: async ({ few }) => {
    if (spawnSync("gap", ["--version"]).error) return { rows: [], notes: ["GAP is not installed: no row with it"] };
    const rows: Row[] = [];
    const failed: string[] = [];
    for (const [symbol, text] of compared) {
      const found = await comparison(symbol, text, few);
      if (found === null) failed.push(`GAP gave no answer for ${symbol} at ${text}`);
      else rows.push(...found);
    }
    const note =
      "GAP answers for its whole finite group, which also has the irreps of the multiples of k; processor time of both";
    return { rows, notes: [note, ...failed] };
  },
};

async function comparison(symbol: string, text: string, pairs: number): Promise<Row[] | null> {
  const group = parseGroup(symbol);
  const components = text.split(",").map((part) => parseRational(part) as Rational) as [Rational, Rational, Rational];
  const k = exactWaveVector(components);
  const order = components.reduce((common, [, denominator]) => Math.max(common, denominator), 2) === 3 ? 6 : 2;
  const whole: number[] = [];
  const perIrrep: number[] = [];
  let irreps = 0;
  const own = () =>
    processorTime(() => {
      for (let round = 0; round < rounds; round++) irreps = smallIrreps(group, k).irreps.length;
    });
  // Until the compiler of the engine has seen enough.
  for (let warm = 0; warm < 5; warm += 1) await own();
  for (let pair = 0; pair < pairs; pair += 1) {
    const time = await own();
    const gap = gapAnswer(group, k, order);
    if (gap === null) return null;
    whole.push(gap.milliseconds / (time / rounds));
    perIrrep.push(gap.milliseconds / gap.irreps / (time / rounds / irreps));
  }
  const over = "kvane";
  return [
    { what: `GAP, ${symbol}, k ${text}, per irrep`, over, ratios: perIrrep },
    { what: `GAP, ${symbol}, k ${text}, all irreps`, over, ratios: whole },
  ];
}

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

function gapAnswer(group: SpaceGroup, k: WaveVector, order: number): { milliseconds: number; irreps: number } | null {
  const { matrices, modulus } = affineGenerators(group, k, order);
  const program = `m:=${modulus};; o:=One(ZmodnZ(m));;
G:=Group(List(${JSON.stringify(matrices)},x->x*o));; H:=Image(IsomorphismPcGroup(G));; Size(H);;
t:=Runtime();; n:=Length(IrreducibleRepresentations(H));; Print(Runtime()-t," ",n,"\\n"); QUIT;\n`;
  const run = spawnSync("gap", ["-q", "-b"], { input: program, encoding: "utf8", timeout: 300_000 });
  const [milliseconds, irreps] = (run.stdout ?? "").trim().split(" ").map(Number);
  const answered = milliseconds !== undefined && irreps !== undefined && !Number.isNaN(irreps);
  return answered ? { milliseconds, irreps } : null;
}
