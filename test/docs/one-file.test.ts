import { spawnSync } from "node:child_process";
import { build } from "esbuild";
import { describe, expect, test } from "vitest";
import { root } from "../tools/paths.mjs";

/**
 * Bundled into one file, what `import()` reaches is set up by calls that esbuild leaves out where a door (an `index` that only
 * passes names on) is said to be without effects: core's package.json names the doors for that reason.
 */
describe("programs that bundle core into one file", () => {
  const printed = async (program: string, format: "esm" | "cjs" = "esm"): Promise<string> => {
    const { outputFiles } = await build({
      stdin: { contents: program, resolveDir: root },
      bundle: true,
      format,
      platform: "node",
      write: false,
    });
    const { stdout, stderr } = spawnSync(
      process.execPath,
      [`--input-type=${format === "esm" ? "module" : "commonjs"}`],
      {
        input: outputFiles[0]?.text ?? "",
        encoding: "utf8",
      },
    );
    expect(stderr).toBe("");
    return stdout;
  };

  // 4 translations of F, 48 operators of m -3 m (International Tables A, no. 225); P n m a is 2/m 2/m 2/m, order 8.
  test("take one name through the door of all rooms", async () => {
    const program = 'import { parseGroup } from "@kvane/core"; console.log(parseGroup("62").operators.length);';
    expect(await printed(program)).toBe("8\n");
  });

  // Σd² = 8 with two irreps of dimension 2 (Bradley & Cracknell, 1972); 4 atoms with 12 components make Σmd = 12.
  test("use rooms beside the whole", async () => {
    const program = `import { answer, parseSite, parseWaveVector, siteModes, siteOrbit, smallIrreps } from "@kvane/core";
      import { parseGroup } from "@kvane/core/spacegroups";
      const group = parseGroup("P n m a");
      const irreps = smallIrreps(group, parseWaveVector("0,1/2,0"));
      const modes = siteModes(group, irreps, siteOrbit(group, parseSite("Fe 0 0 0"), null));
      const { errors } = await answer({ command: "modes", group: "62", k: "0,1/2,0", sites: ["Fe 0 0 0"] }, { readText: async () => "" });
      const components = modes.irreps.reduce((sum, { multiplicity, irrep }) => sum + multiplicity * irrep.dimension, 0);
      console.log(irreps.irreps.map((one) => one.dimension).join(), components, errors.length);`;
    expect(await printed(program)).toBe("2,2 12 0\n");
  });

  // The reader of YAML is CommonJS for Node; docs/embedding.md says so.
  test("read a study, as CommonJS", async () => {
    const program = `import { answer, hostOfTexts } from "@kvane/core";
      const host = hostOfTexts({ "s.yaml": "group: P n m a\\nk: [[0, 1/2, 0]]\\n" });
      answer({ command: "star", study: "s.yaml" }, host).then(({ errors, result }) => console.log(errors, result.arms.length));`;
    expect(await printed(program, "cjs")).toBe("[] 1\n");
  });
});
