import { runCommand } from "./run-command.js";
import { processSurroundings } from "./surroundings.js";
import { removeUnfinished } from "./unfinished.js";

/** Set by Ctrl-C and by batch systems whose time is over; long work looks at it between its steps. */
const signal = { aborted: false };
const interrupted = 130;

/** Milliseconds that work has to end by itself then. */
const grace = 300;

const signals = ["SIGINT", "SIGTERM"] as const;

for (const name of signals)
  process.once(name, () => {
    signal.aborted = true;
    process.once(name, stop);
    setTimeout(stop, grace).unref();
  });

function stop(): void {
  removeUnfinished();
  process.exit(interrupted);
}

function release(): void {
  for (const name of signals) process.removeAllListeners(name);
}

void main();

async function main(): Promise<void> {
  try {
    process.exitCode = await runCommand(process.argv.slice(2), processSurroundings(signal, release));
  } catch (error) {
    removeUnfinished();
    process.stderr.write(
      `error[internal-fault]: kvane met a fault of its own\n  found:    ${String(error)}\n  remedy:   please report it, with the command and the files that led to it\n`,
    );
    process.exitCode = 70;
  }
}
