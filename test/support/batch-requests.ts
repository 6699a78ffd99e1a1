/** A study as text, another for each number. */
function study(number: number): string {
  return `title: study ${number}
group: P n m a
cell: {a: ${(9 + (number % 100) / 100).toFixed(2)}, b: 6.9, c: 9.5, alpha: 90, beta: 90, gamma: 90}
k: [[0, 1/2, 0]]
peaks: {file: d.txt, as: d}
`;
}

const groups = ["P n m a", "P 63/m m c", "I 41/a m d:2", "R -3 m:H", "P 21/c", "C 2/m", "P 4/m m m", "P -1"];
const vectors = ["0,0,0", "0,1/2,0", "0,0.3,0", "1/3,1/3,0", "0.1,0.2,0.3"];

/**
 * The request of a number, one of a varied stream: commands, groups and wave vectors in turn, with studies that come
 * along as texts, no two of them alike.
 */
export function batchRequest(number: number): { readonly [field: string]: unknown } {
  const group = groups[number % groups.length];
  const k = vectors[Math.floor(number / groups.length) % vectors.length];
  const named = {
    study: `${number}.yaml`,
    texts: { [`${number}.yaml`]: study(number), "d.txt": "7.765 0.01\n5.561 0.01\n" },
  };
  const kinds = [
    { command: "ops", group },
    { command: "star", group, k },
    { command: "irreps", group, k },
    { command: "modes", group, k, sites: ["A 0 0 0"] },
    { command: "check", ...named },
    { command: "satellites", qMax: "1.5", ...named },
    { command: "index", ...named },
    // One in eight is wrong.
    { command: "star", group, k: "half" },
  ];
  return { id: number, ...kinds[number % kinds.length] };
}

/** So many of them as lines. */
export function batchLines(count: number, first = 0): string {
  return Array.from({ length: count }, (_, index) => `${JSON.stringify(batchRequest(first + index))}\n`).join("");
}
