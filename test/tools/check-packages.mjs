// @ts-check
/** Looks at both packages with publint, and at the types of core as its users' compilers will find them. */
import { runPnpm } from "./run-program.mjs";

const checks = [
  ["exec", "publint", "run", "packages/core", "--strict"],
  ["exec", "publint", "run", "packages/cli", "--strict"],
  ["exec", "attw", "--pack", "packages/core", "--profile", "esm-only", "--quiet"],
];
for (const parameters of checks) {
  try {
    runPnpm(parameters);
  } catch (error) {
    console.error(error instanceof Error ? error.message : error);
    process.exitCode = 1;
  }
}
