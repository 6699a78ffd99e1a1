import {
  formatMagneticTriplet,
  identifyMagneticGroup,
  type MagneticOperator,
  magneticGroup,
  magneticGroupTable,
} from "@kvane/core/magneticgroups";
import {
  groupFromSetting,
  latticeFromVectors,
  latticeVectors,
  type SpaceGroup,
  tabulatedSettings,
} from "@kvane/core/spacegroups";
import { describe, expect, it } from "vitest";
import { type Coloring, coloringClasses } from "../support/magnetic-families.js";

/**
 * The 1651 types counted without the table: 230 families, each alone, grey, and with every index-two subgroup up to the
 * proper affine normalizer (A. M. Zamorzaev 1953; N. V. Belov, N. N. Neronova, T. S. Smirnova 1957: 230 + 230 + 674 +
 * 517). Each class is then named by the identification: every BNS number must come once, in the family that its OG
 * number begins with.
 */
const families = tabulatedSettings()
  .filter((setting) => setting.standard)
  .map((setting) => ({ number: setting.number, group: groupFromSetting(setting) }));
const classes = families.map(({ number, group }) => ({ number, group, colorings: coloringClasses(group) }));

/** The magnetic group of a homomorphism: basis translations with −1 leave the lattice and become anti-translations. */
function coloredGroup(group: SpaceGroup, { translations, operators }: Coloring) {
  const basis = latticeVectors(group.lattice);
  const odd = basis.filter((_, axis) => translations[axis] === 1);
  const sums = odd.flatMap((first) => odd.map((second) => first.map((entry, axis) => sumOf(entry, second[axis]))));
  const even = basis.filter((_, axis) => translations[axis] === 0);
  const lattice = latticeFromVectors([...even, ...(sums as unknown as typeof even)]);
  const plain = group.operators.map(
    (operator, index): MagneticOperator => ({ operator, timeReversal: operators[index] === 1 ? -1 : 1 }),
  );
  const anti = odd.slice(0, 1).map((vector): MagneticOperator => {
    const numerators = vector.map(([top, bottom]) => (top * 24) / bottom);
    return {
      operator: {
        ...(group.operators[0] as MagneticOperator["operator"]),
        translation: numerators as unknown as [number, number, number],
      },
      timeReversal: -1,
    };
  });
  return magneticGroup(lattice, [...plain, ...anti]);
}

function sumOf(a: readonly [number, number], b: readonly [number, number] | undefined): readonly [number, number] {
  const [top, bottom] = b ?? [0, 1];
  const common = [a[0] * bottom + top * a[1], a[1] * bottom] as const;
  const divisor = gcd(common[0], common[1]);
  return [common[0] / divisor, common[1] / divisor];
}

function gcd(a: number, b: number): number {
  return b === 0 ? Math.abs(a) || 1 : gcd(b, a % b);
}

describe("index-two subgroups of the 230 space groups", () => {
  it("come to 674 with all translations and 517 without", () => {
    const all = classes.flatMap((one) => one.colorings);
    expect(all.filter((one) => one.translations.every((bit) => bit === 0))).toHaveLength(674);
    expect(all.filter((one) => one.translations.some((bit) => bit === 1))).toHaveLength(517);
  });

  it("are the types III and IV of the table, family by family, each once", () => {
    const problems: string[] = [];
    const reached = new Map<string, string>();
    for (const { number, group, colorings } of classes)
      for (const coloring of colorings) {
        const magnetic = coloredGroup(group, coloring);
        const { name } = identifyMagneticGroup(magnetic);
        const shown = `${number}: ${magnetic.operators.map(formatMagneticTriplet).join(" ")}`;
        const known = reached.get(name.bns.number);
        if (known !== undefined) problems.push(`${name.bns.number} twice: ${known} and ${shown}`);
        if (Number(name.og.number.split(".")[0]) !== number) problems.push(`${shown} is called ${name.og.number}`);
        reached.set(name.bns.number, shown);
      }
    const missing = magneticGroupTable().filter((row) => row.type >= 3 && !reached.has(row.name.bns.number));
    expect([...problems, ...missing.map((row) => `${row.name.bns.number} never came`)]).toEqual([]);
  });
});
