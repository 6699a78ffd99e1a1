import { DefaultReporter, type TestModule, type TestRunEndReason } from "vitest/node";

/** Numbers of one run as the last line gives them. */
interface Count {
  passed: number;
  failed: number;
  skipped: number;
}

/** A file that cannot be loaded has no tests to count, so it counts as one that failed. */
function countModule(module: TestModule, count: Count): void {
  let failedTests = 0;
  for (const test of module.children.allTests()) {
    const { state } = test.result();
    if (state === "passed") count.passed += 1;
    else if (state === "failed") failedTests += 1;
    else count.skipped += 1;
  }
  // A hook that throws fails the module without failing a test.
  if (failedTests === 0 && module.state() === "failed") failedTests = 1;
  count.failed += failedTests;
}

/**
 * The usual listing, then `N passed, N failed` alone on the last line.
 * With `CI` set nothing may be skipped unseen: a skipped test counts as failed.
 */
export class KvaneReporter extends DefaultReporter {
  override onTestRunEnd(
    modules: ReadonlyArray<TestModule>,
    errors: Parameters<DefaultReporter["onTestRunEnd"]>[1],
    reason: TestRunEndReason,
  ): void {
    super.onTestRunEnd(modules, errors, reason);
    const count: Count = { passed: 0, failed: 0, skipped: 0 };
    for (const module of modules) countModule(module, count);
    if (process.env["CI"] && count.skipped > 0) {
      this.log(`${count.skipped} skipped, counted as failed because CI is set`);
      count.failed += count.skipped;
      count.skipped = 0;
    }
    // An error outside every test, an interruption, or no test at all is a failure too.
    const nothingRan = count.passed + count.failed + count.skipped === 0;
    if (count.failed === 0 && (errors.length > 0 || reason !== "passed" || nothingRan)) {
      count.failed = 1;
    }
    if (count.failed > 0) process.exitCode = 1;
    const skipped = count.skipped > 0 ? `, ${count.skipped} skipped` : "";
    this.log(`${count.passed} passed, ${count.failed} failed${skipped}`);
  }
}
