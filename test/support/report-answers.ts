import { answer } from "@kvane/core/job";
import type { Envelope, RunRecord } from "@kvane/core/reports";

/** The answer of the whole job to a study given as text, with the files that it names. */
export async function runAnswer(
  study: string,
  files: { readonly [name: string]: string } = {},
): Promise<Envelope<RunRecord>> {
  const texts: { readonly [name: string]: string } = { "study.yaml": study, ...files };
  const answered = await answer(
    { command: "run", study: "study.yaml", files: true },
    { signal: { aborted: false }, readText: async (path) => texts[path] ?? "" },
  );
  if (answered.errors.length > 0) throw new Error(JSON.stringify(answered.errors));
  return answered as Envelope<RunRecord>;
}

/** A text that would do harm in a page, a table or a drawing that did not escape it. */
export const hostile = `<img src=x onerror=alert(1)>|*_\`</script><!--&amp;"'`;

/** Invented: a rock-salt oxide with the k of antiferromagnetic MnO. */
export const rockSalt = `title: ${JSON.stringify(hostile)}
group: F m -3 m
cell: {a: 4.44, b: 4.44, c: 4.44, alpha: 90, beta: 90, gamma: 90}
sites:
  - {label: "Mn<img/src=x/onerror=alert(2)>", at: [0, 0, 0]}
k: [[1/2, 1/2, 1/2]]
`;

/** Invented: a triangular lattice with the k of the 120° order. */
export const triangles = `title: Triangles (invented)
group: P 6/m m m
cell: {a: 6.1, b: 6.1, c: 5.2, alpha: 90, beta: 90, gamma: 120}
sites:
  - {label: Fe, at: [0, 0, 0]}
k: [[1/3, 1/3, 0]]
`;

/** Invented: two given k and a list of d with intensities; peaks on nuclear lines and λ/2 images. */
export const listed = `title: Listed (invented)
group: C 1 2/c 1
cell: {a: 9.8, b: 8.9, c: 5.3, alpha: 90, beta: 105.7, gamma: 90}
sites:
  - {label: Mn, at: [0, 0.906, 1/4]}
k: [[0, 1, 0], [0, 0, 1/2]]
peaks: {file: d.txt, as: d}
`;

export const listedFiles = {
  "d.txt": "d su intensity\n8.90 0.02 100\n4.67 0.01 40\n6.5 0.01 22\n3.11 0.01 5\n2.95 0.01 11\n",
};
