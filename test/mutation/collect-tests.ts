import { createRequire } from "node:module";
import { join } from "node:path";
import { format } from "node:util";
import { root } from "../tools/paths.mjs";

/** A test of a file, ready to run apart from the others of its file. */
export interface CollectedTest {
  readonly name: string;
  readonly run: () => Promise<void>;
}

type Action = (...values: unknown[]) => unknown;

interface Group {
  readonly name: string;
  readonly before: Action[];
  readonly after: Action[];
}

/** Stands in for vitest: what files say to `describe` and `test` is collected, `expect` is that of vitest. */
export interface Collector {
  readonly api: Record<string, unknown>;
  readonly tests: readonly CollectedTest[];
}

export function createCollector(): Collector {
  const tests: CollectedTest[] = [];
  let groups: readonly Group[] = [{ name: "", before: [], after: [] }];
  const innermost = (): Group => groups.at(-1) as Group;

  const describe = (name: string, ...rest: unknown[]): void => {
    const outer = groups;
    groups = [...groups, { name, before: [], after: [] }];
    actionOf(rest)();
    groups = outer;
  };
  const test = (name: string, ...rest: unknown[]): void => {
    const around = groups;
    const action = actionOf(rest);
    tests.push({
      name: [...around.slice(1).map((group) => group.name), name].join(" > "),
      run: async () => {
        for (const group of around) for (const hook of group.before) await hook();
        try {
          await action();
        } finally {
          for (const group of around) for (const hook of group.after) await hook();
        }
      },
    });
  };
  const withTables = (define: typeof test) =>
    Object.assign(define, {
      each: tableOf(define, true),
      for: tableOf(define, false),
      skipIf: (skips: boolean) => (skips ? () => {} : define),
    });
  return {
    api: {
      describe: withTables(describe),
      test: withTables(test),
      it: withTables(test),
      expect: expectOfVitest(),
      beforeAll: (hook: Action) => innermost().before.push(hook),
      afterAll: (hook: Action) => innermost().after.push(hook),
    },
    tests,
  };
}

/** Options and time limits stand before or after the function; here the time is watched from outside. */
function actionOf(rest: readonly unknown[]): Action {
  return rest.find((part): part is Action => typeof part === "function") ?? (() => {});
}

/** `each` hands the entries of a row over one by one, `for` the row as it is. */
function tableOf(define: (name: string, action: Action) => void, spreads: boolean) {
  return (rows: readonly unknown[]) =>
    (name: string, ...rest: unknown[]): void => {
      const action = actionOf(rest);
      for (const row of rows) {
        const values = Array.isArray(row) ? row : [row];
        define(format(name, ...values.map(String)), () => (spreads ? action(...values) : action(row)));
      }
    };
}

/** Outside its runner vitest gives no `expect`, so it is put together from the same parts. */
function expectOfVitest(): unknown {
  const ofVitest = createRequire(createRequire(join(root, "package.json")).resolve("vitest/package.json"));
  const parts = ofVitest("@vitest/expect") as Record<string, unknown> & { chai: Chai };
  const { chai } = parts;
  for (const name of ["JestExtend", "JestChaiExpect", "JestAsymmetricMatchers"]) chai.use(parts[name]);
  const expect = (value: unknown, message?: string): unknown => chai.expect(value, message);
  return Object.assign(expect, chai.expect, parts["customMatchers"], asymmetric(parts));
}

interface Chai {
  readonly use: (plugin: unknown) => void;
  readonly expect: (value: unknown, message?: string) => unknown;
}

function asymmetric({ ASYMMETRIC_MATCHERS_OBJECT: key }: Record<string, unknown>): unknown {
  return (globalThis as Record<symbol, unknown>)[key as symbol];
}
