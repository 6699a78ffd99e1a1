import { fail } from "../../errors/index.js";
import { formatWaveVector, numericWaveVector, type WaveVector } from "../../kvectors/index.js";
import type { SiteOrbit } from "../../spacegroups/index.js";
import type { Work } from "../work.js";
import { optionOf } from "./given.js";
import { readNamed } from "./read-file.js";

/** The text of a list of Fourier components, with its name; null when none was asked for. */
export async function componentsIfGiven({ request, host }: Work): Promise<{ file: string; text: string } | null> {
  const given = optionOf(request, "read");
  return given && { file: given.text, text: await readNamed(host, given.text, given.where) };
}

/** The components of every atom of the one site that there must be, at a k that has numbers. */
export async function componentsFor(
  { file, text }: { readonly file: string; readonly text: string },
  orbits: readonly SiteOrbit[],
  k: WaveVector,
) {
  const [orbit] = orbits;
  if (orbit === undefined || orbits.length > 1)
    fail("conflicting-arguments", "--read goes with one site", {
      where: { argument: "--read" },
      expected: "one --site",
      found: `${orbits.length} sites`,
      remedy: "give the site that the list belongs to",
    });
  if (numericWaveVector(k) === null)
    fail("k-needs-values", `components need a number for every letter of ${formatWaveVector(k)}`, {
      where: { argument: "--k" },
      expected: "fractions or decimals, such as 0,0.472,0",
      remedy: "give numbers in place of the letters, or leave --read out",
    });
  const { parseFourierComponents } = await import("../../files/index.js");
  return { file, components: parseFourierComponents(text, { file, atoms: orbit.positions.length }) };
}
