import { readdirSync, readFileSync } from "node:fs";
import { join } from "node:path";
import { root } from "../../tools/paths.mjs";

/** Kinds of files that kvane reads. */
export type FileKind = "cif" | "magnetic-cif" | "study" | "peaks" | "intensities" | "scan" | "moments" | "components";

/** Good files of every kind to spoil: those of the tests and of the example. Bad ones too where there are some. */
export const corpus: { readonly [kind in FileKind]: readonly string[] } = {
  cif: ["good", "bad", "structures", "refused"].flatMap((name) => textsIn(`test/fixtures/cif/${name}`, /\.cif$/)),
  "magnetic-cif": [
    ...textsIn("test/fixtures/magnetic-cif", /\.cif$/),
    ...textsIn("packages/cli/example", /^moments\.mcif$/),
    ...textsIn("docs/examples", /\.mcif$/),
  ],
  study: [...textsIn("test/fixtures/studies", /\.yaml$/), ...textsIn("packages/cli/example", /\.yaml$/)],
  peaks: [...textsIn("test/fixtures/peaks", /./), ...textsIn("packages/cli/example", /^satellites\.csv$/)],
  intensities: [
    ...textsIn("packages/cli/example", /^integrated\.csv$/),
    "h k l intensity intensity-su polarization\n0 0.5 0 90 4 0.9\n1 0.5 0 60 3 -0.9\n0 0.5 1 25 3 0\n",
    "d, I, sigma(I)\n4.1, 120, 3\n3.2, 0, 2\n2.2, 55, 4\n",
  ],
  scan: [
    ...textsIn("packages/cli/example", /^scan\.csv$/),
    "T k su A su B su\n2 0.281 0.001 100 3 50 2\n10 0.279 0.001 90 3 49 2\n20 0.274 0.001 70 3 1 2\n30 0.25 0.001 4 3 0 2\n",
    "temperature;I\n1,5;100\n3,0;80\n4,5;0\n",
  ],
  moments: [
    "# label x y z mx my mz\nFe1 0 0 0 1.5 0 0\nFe1 1/2 1/2 1/2 -1.5 0 0\nMn2 0.137 1/4 0.308 0 0.3 2e-1\n",
    "label, x, y, z, mx, my, mz\nA, 0.05, 0.25, 0.98, 0, 1, 0\nA, 0.95, 0.75, 0.02, 0, -1, 0\n",
  ],
  components: ["# S\n1 0 0.5+0.1i 0\n2 0 -0.3i 0\n3 1e-3-2e-2i i -i\n", "1, 1, 0, 0\n2, -1, 0.5*i, 0\n"],
};

/** The bundled study and the lists that it names, which are in the corpus too. */
export const exampleTexts: { readonly [kind in FileKind]?: string } = {
  study: exampleFile("study.yaml"),
  peaks: exampleFile("satellites.csv"),
  intensities: exampleFile("integrated.csv"),
};

function exampleFile(name: string): string {
  return readFileSync(join(root, "packages/cli/example", name), "utf8");
}

function textsIn(folder: string, name: RegExp): string[] {
  return readdirSync(join(root, folder))
    .filter((one) => name.test(one) && one !== "ORIGIN.md")
    .sort()
    .map((one) => readFileSync(join(root, folder, one), "utf8"))
    .filter((text) => text.length < 30_000);
}
