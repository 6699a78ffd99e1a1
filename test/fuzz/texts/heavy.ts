import type { Random } from "../../support/random.js";
import type { FileKind } from "./corpus.js";
import { extremeNumbers, marks } from "./tokens.js";

/** Texts that cost a careless reader its stack, its memory or its patience; of at most some hundred thousand characters. */
export function heavyText(kind: FileKind, random: Random): string {
  const makers =
    kind === "study" ? [...anyKind, ...yamlOnly] : kind.includes("cif") ? [...anyKind, ...cifOnly] : anyKind;
  return random.pick(makers)(random).slice(0, longest);
}

/** Characters: what is larger is tried in single tests. */
const longest = 200_000;

type Maker = (random: Random) => string;

/** A count that is small mostly and large sometimes. */
function count(random: Random): number {
  return 10 ** (1 + random.below(4)) + random.below(50);
}

const anyKind: readonly Maker[] = [
  (random) => random.pick(marks).repeat(count(random)),
  (random) => `${random.pick(marks)}${random.pick(marks)}`.repeat(count(random)),
  // Many rows of one form.
  (random) => {
    const row = Array.from({ length: 1 + random.below(8) }, () => random.pick(extremeNumbers).slice(0, 12)).join(" ");
    return `${row}\n`.repeat(Math.ceil(count(random) / 4));
  },
  // A few very long lines.
  (random) => `${`${random.pick(extremeNumbers)} `.repeat(Math.ceil(count(random) / 8))}\n`.repeat(1 + random.below(3)),
];

const yamlOnly: readonly Maker[] = [
  (random) => "[".repeat(count(random)),
  (random) => "{a: ".repeat(count(random)),
  (random) => `${"[".repeat(count(random))}1${"]".repeat(count(random))}`,
  (random) => `group: ${"- ".repeat(count(random))}a`,
  (random) => Array.from({ length: Math.min(400, count(random)) }, (_, depth) => `${" ".repeat(depth)}a:`).join("\n"),
  // Each alias doubles the last: nine lines that would be a thousand million words.
  (random) => {
    const width = 2 + random.below(9);
    const lines = ["a0: &a0 [x, x]"];
    for (let level = 1; level < 9 + random.below(30); level += 1)
      lines.push(`a${level}: &a${level} [${Array.from({ length: width }, () => `*a${level - 1}`).join(", ")}]`);
    return lines.join("\n");
  },
  () => "a: &a\n  b: *a\n<<: *a\n",
  (random) => Array.from({ length: count(random) }, (_, index) => `k${index}: ${index}`).join("\n"),
  (random) => `group: P n m a\n${"title: x\n".repeat(Math.ceil(count(random) / 4))}`,
  (random) => `sites:\n${"  - {label: A, at: [0, 0, 0]}\n".repeat(Math.ceil(count(random) / 20))}`,
  (random) => `k: [${"[0, 1/2, 0], ".repeat(Math.ceil(count(random) / 10))}]`,
];

const cifOnly: readonly Maker[] = [
  (random) => `#\\#CIF_2.0\ndata_a\n_x ${"[".repeat(count(random))}`,
  (random) => `#\\#CIF_2.0\ndata_a\n_x ${"{'a':".repeat(count(random))}`,
  (random) => `data_a\n${Array.from({ length: count(random) }, (_, index) => `_n${index} ${index}`).join("\n")}`,
  (random) => Array.from({ length: count(random) }, (_, index) => `data_b${index}`).join("\n"),
  (random) => `data_a\nloop_\n_a\n_b\n${"1 2\n".repeat(count(random))}${random.pick(["", "1"])}`,
  (random) => `data_a\nloop_\n_space_group_symop_operation_xyz\n${"x,y,z\n".repeat(Math.ceil(count(random) / 4))}`,
  (random) =>
    `data_a\nloop_\n_space_group_symop_operation_xyz\n${Array.from({ length: Math.ceil(count(random) / 20) }, (_, index) => `x,y,z+${index}/${count(random)}`).join("\n")}\n`,
];
