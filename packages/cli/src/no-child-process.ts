/** Stands for `node:child_process` in the bundle: kvane starts no other program. */
export function spawn(): never {
  throw new Error("kvane starts no other program");
}
