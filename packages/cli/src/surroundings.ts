/** Everything outside that the command touches, so that tests can run it without a process of its own. */
export interface Surroundings {
  readonly write: (text: string) => void;
  readonly writeError: (text: string) => void;
  /** Whether the error output is a terminal, where progress can be shown. */
  readonly showsProgress: boolean;
  readonly standardInput: () => Promise<Uint8Array>;
  /** Where relative file names count from. */
  readonly folder: string;
  /** Set when the user wants the work to end. */
  readonly signal: { readonly aborted: boolean };
}

/** Those of this process. */
export function processSurroundings(signal: { readonly aborted: boolean }): Surroundings {
  return {
    write: (text) => {
      process.stdout.write(text);
    },
    writeError: (text) => {
      process.stderr.write(text);
    },
    showsProgress: process.stderr.isTTY === true,
    standardInput: async () => {
      const parts: Uint8Array[] = [];
      for await (const part of process.stdin) parts.push(part as Uint8Array);
      return Buffer.concat(parts);
    },
    folder: process.cwd(),
    signal,
  };
}
