import { KvaneError, type Problem } from "@kvane/core/errors";

/** The problems that `action` throws; none when it ends well. Any other error is thrown on. */
export async function problemsOf(action: () => unknown): Promise<readonly Problem[]> {
  try {
    await action();
    return [];
  } catch (error) {
    if (error instanceof KvaneError) return error.problems;
    throw error;
  }
}

/** `code line:column path` of each problem, for comparing whole lists. */
export function places(problems: readonly Problem[]): string[] {
  return problems.map(({ code, where }) =>
    [code, `${where.line ?? "-"}:${where.column ?? "-"}`, where.path ?? where.argument ?? ""].join(" ").trim(),
  );
}
