import { defineConfig } from "vitest/config";
import { KvaneReporter } from "./test/tools/reporter.ts";
import { resolveTarget, targetFromEnvironment } from "./test/tools/targets.mjs";

// One set of tests, three things to test: the source, what was built from it, what was packed.
const target = resolveTarget(targetFromEnvironment());

export default defineConfig({
  resolve: {
    alias: [
      { find: /^@kvane\/core$/, replacement: target.entry("") },
      { find: /^@kvane\/core\/([a-z-]+)$/, replacement: target.entry("$1") },
      { find: /^#core\//, replacement: `${target.coreFolder}/` },
    ],
  },
  test: {
    include: ["test/**/*.test.ts"],
    exclude: ["test/fixtures/**"],
    env: { KVANE_TEST_TARGET: target.name, KVANE_TEST_COMMAND: target.command },
    reporters: [new KvaneReporter()],
    pool: "threads",
    // Core has no global state, so that files of one worker may share its loaded modules.
    isolate: false,
    maxWorkers: 2,
    // Idle, no test takes more than half of it; a machine with other work is several times slower.
    testTimeout: 60_000,
    hookTimeout: 60_000,
    // A page on a busy machine redraws late; the default of a second ends before it.
    expect: { poll: { timeout: 10_000 } },
    server: { deps: { external: target.name === "source" ? [] : [/\/dist\//] } },
  },
});
