import { readFileSync } from "node:fs";
import { join } from "node:path";
import { parseCif, readCifStructure } from "@kvane/core/files";
import { operatorsModuloIntegers } from "@kvane/core/spacegroups";
import { describe, expect, test } from "vitest";
import { type Random, seeded } from "../support/random.js";
import { root } from "../tools/paths.mjs";

/** The 530 settings with their operators, expanded by another program (test/fixtures/ORIGIN.md). */
interface Setting {
  readonly number: number;
  readonly hall: string;
  readonly full: string;
  readonly choice: string;
  /** Nine rotation integers row by row, three translations in 24ths. */
  readonly ops: readonly (readonly number[])[];
}

const settings: readonly Setting[] = JSON.parse(readFileSync(join(root, "test/fixtures/settings.json"), "utf8"));

const key = (numbers: readonly number[]) => numbers.join(",");
const keysOf = ({ ops }: Setting) => ops.map(key).sort();

/** The same keys of what was read. */
async function keysIn(text: string): Promise<string[]> {
  const { symmetry, problems } = await readCifStructure(await parseCif(text, "test.cif"));
  expect(problems.symmetry).toEqual([]);
  return (symmetry ? operatorsModuloIntegers(symmetry.group) : [])
    .map(({ rotation, translation, translationDenominator }) =>
      key([...rotation, ...translation.map((entry) => (entry * 24) / translationDenominator)]),
    )
    .sort();
}

/** A row of a triplet in one of the ways in which files have it. */
function row(rotation: readonly number[], translation: number, random: Random): string {
  const letters = random.pick(["xyz", "XYZ"]);
  const terms = rotation.flatMap((entry, index) =>
    entry === 0 ? [] : [`${entry < 0 ? "-" : random.pick(["", "+"])}${letters[index]}`],
  );
  const join = (parts: readonly string[]) =>
    parts.map((part, index) => (index > 0 && !/^[+-]/.test(part) ? `+${part}` : part)).join(random.pick(["", " "]));
  if (translation === 0) return join(terms);
  const divisor = [24, 12, 8, 6, 4, 3, 2, 1].find((one) => translation % one === 0) ?? 1;
  const digits = 2 + random.below(5);
  const shift = random.pick([`${translation / divisor}/${24 / divisor}`, (translation / 24).toFixed(digits)]);
  return random.below(2) === 0 ? join([shift, ...terms]) : join([...terms, shift]);
}

function operatorLoop({ ops }: Setting, random: Random): string {
  const name = random.pick([
    "_space_group_symop_operation_xyz",
    "_symmetry_equiv_pos_as_xyz",
    "_space_group_symop.operation_xyz",
  ]);
  const texts = ops.map((one) =>
    [0, 1, 2]
      .map((index) => row(one.slice(3 * index, 3 * index + 3), one[9 + index] ?? 0, random))
      .join(random.pick([",", ", "])),
  );
  return `loop_\n${name}\n${texts.map((text) => `'${text}'`).join("\n")}\n`;
}

describe("the settings of International Tables through a CIF (seed 11)", () => {
  const random = seeded(11);
  const sample = process.env["KVANE_ALL_SETTINGS"] ? settings : Array.from({ length: 40 }, () => random.pick(settings));

  test("by their operators, as files write them", async () => {
    for (const setting of sample)
      expect(await keysIn(`data_x\n${operatorLoop(setting, random)}`), setting.hall).toEqual(keysOf(setting));
  });

  test("by their Hall symbols", async () => {
    for (const setting of sample) {
      const quote = setting.hall.includes("'") ? ";" : "'";
      const value = quote === ";" ? `\n;${setting.hall}\n;` : `'${setting.hall}'`;
      expect(await keysIn(`data_x\n_space_group_name_Hall ${value}\n`), setting.hall).toEqual(keysOf(setting));
    }
  });

  test("by their Hermann–Mauguin symbols with the code of the setting", async () => {
    for (const setting of sample) {
      const { full, choice, hall } = setting;
      const symbol = full.replaceAll("_", random.pick(["", "_"]));
      const text =
        choice === ""
          ? `_space_group_name_H-M_alt '${symbol}'\n`
          : random.pick([
              `_space_group_name_H-M_alt '${symbol} :${choice}'\n`,
              `_space_group_name_H-M_alt '${symbol}'\n_space_group_IT_coordinate_system_code ${choice}\n`,
            ]);
      expect(await keysIn(`data_x\n${text}`), `${full} ${choice} ${hall}`).toEqual(keysOf(setting));
    }
  });
});
