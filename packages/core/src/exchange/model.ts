import { fail, KvaneError, nearMiss, type Place, type Problem, problem } from "../errors/index.js";
import type { BondClass, BondTable, Coupling, ExchangeModel, NamedConstant } from "./types.js";

/** One constant as a user gives it: for a whole shell, for one class of it, or for the bonds between two sites. */
export interface GivenCoupling {
  /** `2` for a shell, `2b` for one of its classes. */
  readonly bond: string;
  /** Only bonds between sites of these labels. */
  readonly between: readonly [string, string] | null;
  readonly j: number;
  /** Where it stands, for messages. */
  readonly where?: Partial<Place>;
}

/** The number of the farthest shell that constants name; 0 for none. */
export function farthestShell(given: readonly Pick<GivenCoupling, "bond">[]): number {
  return Math.max(0, ...given.map(({ bond }) => Number.parseInt(bond, 10)).filter(Number.isFinite));
}

/**
 * Constants with the bonds that they stand for. `E = Σ J S·S`, every bond once, so J > 0 is antiferromagnetic.
 *
 * @param spins |S| by label; 1 where it is not given
 * @throws `invalid-argument` for a bond that the table has not, `conflicting-arguments` for one that got two constants;
 *   all at once
 */
export function exchangeModel(
  table: BondTable,
  given: readonly GivenCoupling[],
  spins: Readonly<Record<string, number>> = {},
): ExchangeModel {
  const problems: Problem[] = [];
  const chosen = new Map<string, Coupling>();
  for (const one of given) {
    const classes = classesNamed(table, one);
    if (classes.length === 0) problems.push(noBond(table, one));
    for (const bonds of classes) {
      const other = chosen.get(bonds.name);
      if (other) problems.push(twice(table, bonds, one, other));
      chosen.set(bonds.name, { bonds, j: one.j, constant: constantName(one, classes) });
    }
  }
  if (problems.length > 0) throw new KvaneError(problems);
  const order = table.shells.flatMap(({ classes }) => classes.map(({ name }) => name));
  return {
    table,
    couplings: [...chosen.values()].sort((a, b) => order.indexOf(a.bonds.name) - order.indexOf(b.bonds.name)),
    lengths: table.atoms.map(({ label }) => spins[label] ?? 1),
    potentials: table.atoms.map(() => 0),
  };
}

/** The same model with another constant for some classes, by name. */
export function withConstants(model: ExchangeModel, constants: Readonly<Record<string, number>>): ExchangeModel {
  for (const name of Object.keys(constants))
    if (!model.couplings.some(({ bonds }) => bonds.name === name))
      fail("invalid-argument", `no constant is given for the bonds ${name}`, {
        expected: model.couplings.map(({ bonds }) => bonds.name).join(", "),
        found: name,
      });
  return {
    ...model,
    couplings: model.couplings.map((one) => ({ ...one, j: constants[one.bonds.name] ?? one.j })),
  };
}

/** The constants as they were given, nearest bonds first. */
export function namedConstants({ couplings }: ExchangeModel): NamedConstant[] {
  const names = [...new Set(couplings.map(({ constant }) => constant))];
  return names.map((name) => {
    const own = couplings.filter(({ constant }) => constant === name);
    return { name, classes: own.map(({ bonds }) => bonds.name), j: (own[0] as Coupling).j };
  });
}

/** What a constant is called: as its bonds were named; those of a shell between two sites by their classes. */
export function constantName(
  { bond, between }: Pick<GivenCoupling, "bond" | "between">,
  classes: readonly Pick<BondClass, "name">[],
): string {
  return between === null ? bond : classes.map(({ name }) => name).join("=");
}

/** The classes that a name stands for: `2` for all of the shell, `2b` for one; with labels only those between them. */
export function classesNamed(
  table: BondTable,
  { bond, between }: Pick<GivenCoupling, "bond" | "between">,
): readonly BondClass[] {
  const pair = between && [...between].sort().join(" ");
  return table.shells
    .flatMap(({ classes }) => classes)
    .filter(
      ({ name, shell, labels }) =>
        (name === bond || String(shell) === bond) && (pair === null || labels.join(" ") === pair),
    );
}

/**
 * The classes that a name stands for, at least one.
 *
 * @throws `invalid-argument` for bonds that the table has not
 */
export function bondsNamed(
  table: BondTable,
  named: Pick<GivenCoupling, "bond" | "between" | "where">,
): readonly BondClass[] {
  const classes = classesNamed(table, named);
  if (classes.length === 0) throw new KvaneError([noBond(table, named)]);
  return classes;
}

function noBond(
  table: BondTable,
  { bond, between, where }: Pick<GivenCoupling, "bond" | "between" | "where">,
): Problem {
  const classes = table.shells.flatMap((shell) => shell.classes);
  const labels = [...new Set(table.atoms.map(({ label }) => label))];
  const unknown = between?.find((label) => !labels.includes(label));
  const near = unknown === undefined ? null : nearMiss(unknown, labels);
  const what = between === null ? `bonds ${bond}` : `bonds ${bond} between ${between.join(" and ")}`;
  const names = classes.slice(-20).map(({ name, labels: ends }) => `${name} (${ends.join("–")})`);
  return problem("invalid-argument", unknown === undefined ? `there are no ${what}` : `there is no site ${unknown}`, {
    where: where ?? {},
    expected: unknown === undefined ? `one of ${names.join(", ")}` : `one of ${labels.join(", ")}`,
    found: unknown ?? bond,
    remedy:
      near === null ? "`kvane exchange` without constants lists the shells of neighbours" : `did you mean \`${near}\`?`,
  });
}

function twice(table: BondTable, bonds: BondClass, { bond, where }: GivenCoupling, other: Coupling): Problem {
  const mates = classesNamed(table, { bond: String(bonds.shell), between: null }).map(({ name }) => name);
  const wide = [bond, other.constant].includes(String(bonds.shell)) && bond !== other.constant;
  return problem("conflicting-arguments", `the bonds ${bonds.name} are given two constants`, {
    where: where ?? {},
    expected: "one J for each bond",
    found: bond === other.constant ? `${bond} twice` : `${other.constant} and ${bond}`,
    remedy: wide ? `instead of ${bonds.shell} name its kinds apart: ${mates.join(", ")}` : "leave one of them out",
  });
}
