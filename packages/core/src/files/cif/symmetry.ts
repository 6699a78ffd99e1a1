import { type Assumption, fail, KvaneError, type Place, type Problem, problem } from "../../errors/index.js";
import { identifyMagneticGroup, magneticGroup } from "../../magneticgroups/index.js";
import type { Cell, ParsedGroup, SpaceGroup } from "../../spacegroups/index.js";
import { type BlockReader, valuesOf } from "./block-reader.js";
import { sameGroup } from "./group-text.js";
import { blockPlace, valuePlace } from "./places.js";
import { groupOfOperators, operatorLists, otherList } from "./symmetry-operators.js";
import { type SymbolKind, type SymbolStatement, symbolStatements } from "./symmetry-symbols.js";

/** The space group of a CIF and where it was taken from. */
export interface CifSymmetry {
  readonly group: SpaceGroup;
  readonly source: "operators" | SymbolKind;
  readonly place: Partial<Place>;
  readonly assumed: readonly Assumption[];
  /** Statements that contradict the one believed, or cannot be read. */
  readonly warnings: readonly Problem[];
}

/**
 * The symmetry of a block: of its operators, else its Hall symbol, else its Hermann–Mauguin symbol, else its number.
 * Everything else that the block says of it is held against that. A block that says nothing has no symmetry: it is
 * never taken for P 1.
 *
 * @param cell decides between settings of one symbol
 * @throws `cif-missing`, what `parseGroup` says, `syntax` and `not-a-group` for operators
 */
export function readSymmetry(reader: BlockReader, cell: Cell | null): CifSymmetry {
  const [texts, ...otherLists] = operatorLists(reader);
  const statements = symbolStatements(reader, cell);
  if (texts !== undefined) {
    const { group, first, assumed, warnings } = groupOfOperators(reader, texts);
    const others = statements.flatMap((one) => contradiction(reader, group, null, one) ?? []);
    const lists = otherLists.flatMap((list) => otherList(reader, group, first, list) ?? []);
    const place = valuePlace(reader, first);
    return { group, source: "operators", place, assumed, warnings: [...warnings, ...lists, ...others] };
  }
  const failures: Problem[] = [];
  for (const [index, statement] of statements.entries()) {
    const parsed = readOrNote(statement, failures);
    if (parsed === null) continue;
    const rest = statements.slice(index + 1);
    const others = rest.flatMap((one) => contradiction(reader, parsed.group, statement, one) ?? []);
    return {
      group: parsed.group,
      source: statement.kind,
      place: valuePlace(reader, statement.value),
      assumed: parsed.assumed,
      warnings: [...failures, ...others],
    };
  }
  if (failures.length > 0) throw new KvaneError(failures);
  return refuse(reader);
}

function readOrNote({ read }: SymbolStatement, failures: Problem[]): ParsedGroup | null {
  try {
    return read();
  } catch (error) {
    if (!(error instanceof KvaneError)) throw error;
    failures.push(...error.problems);
    return null;
  }
}

function refuse(reader: BlockReader): never {
  const magnetic = [
    "_space_group_symop_magn_operation_xyz",
    "_space_group_symop_magn_operation_id",
    "_space_group_magn_number_BNS",
  ].some((name) => valuesOf(reader, name).length > 0);
  return fail("cif-missing", `the data block ${reader.block.code} says no symmetry`, {
    where: blockPlace(reader),
    expected: "operators, a Hall symbol, a Hermann–Mauguin symbol or a number of the space group",
    found: magnetic ? "a magnetic space group alone" : "none of them",
    remedy: magnetic
      ? "give the space group of the nuclear structure beside the CIF: GROUP, or `group:` in the study"
      : "add _space_group_symop_operation_xyz, or give the group beside the CIF; write P 1 if it is meant",
  });
}

/**
 * What contradicts the group that was believed, as a warning; null where the two go together.
 *
 * @param believed null for the operators
 */
function contradiction(
  reader: BlockReader,
  group: SpaceGroup,
  believed: SymbolStatement | null,
  statement: SymbolStatement,
): Problem | null {
  const failures: Problem[] = [];
  const other = readOrNote(statement, failures)?.group ?? null;
  const { kind, value } = statement;
  const because =
    other === null ? `is not understood (${failures[0]?.message ?? "unknown"})` : difference(group, other, statement);
  if (because === null) return null;
  // Two data names of one item: which is which, and where, has to be said.
  const twice = believed?.kind === kind;
  const under = twice ? ` ${standing(value)}` : "";
  const taken =
    believed === null
      ? "operators of the file say"
      : twice
        ? `one ${standing(believed.value)} says`
        : `${believed.kind} of the file says`;
  return problem("cif-contradiction", `the ${kind} \`${value.text.trim().slice(0, 60)}\`${under} ${because}`, {
    where: valuePlace(reader, value),
    expected: nameOf(group),
    found: value.raw.slice(0, 60),
    remedy: `taken is what the ${taken}; check which is right`,
  });
}

function standing({ name, line, column }: SymbolStatement["value"]): string {
  return `of ${name} (line ${line}, column ${column})`;
}

function difference(group: SpaceGroup, other: SpaceGroup, { kind, coded }: SymbolStatement): string | null {
  if (sameGroup(group, other)) return null;
  const { number, hermannMauguin } = group.name;
  const otherNumber = typeNumber(other);
  const ownNumber = typeNumber(group);
  if (ownNumber !== otherNumber)
    return `is that of another space group, ${nameOf(other)}${number === null ? `, not of number ${ownNumber}` : ""}`;
  if (number === null || other.name.number === null)
    return kind === "Hall symbol" ? "stands for other operators" : null;
  if (kind === "Hall symbol") return "stands for the same type with another origin or other axes";
  if (kind === "number") return null;
  if (hermannMauguin !== other.name.hermannMauguin) return "is that of other axes";
  return coded ? "names another origin or other axes" : null;
}

/**
 * Number of the space-group type. Operators in axes that are not tabulated have it as well: their group without time
 * reversal is one of type I, whose number in the tables of magnetic groups begins with it.
 */
function typeNumber({ name, lattice, operators }: SpaceGroup): number {
  if (name.number !== null) return name.number;
  const plain = operators.map((operator) => ({ operator, timeReversal: 1 as const }));
  const { bns } = identifyMagneticGroup(magneticGroup(lattice, plain)).name;
  return Number.parseInt(bns.number, 10);
}

function nameOf(group: SpaceGroup): string {
  const { name, pointGroup } = group;
  if (name.number === null)
    return `a group of class ${pointGroup} and number ${typeNumber(group)} in a setting that is not tabulated`;
  const code = name.choice === "" ? "" : `:${name.choice}`;
  return `${name.hermannMauguin}${code} (number ${name.number})`;
}
