import { rmSync } from "node:fs";

/** Unfinished files and folders of this process; removed when it is interrupted. */
export const unfinished = new Set<string>();

/** Removes what was begun and not finished. */
export function removeUnfinished(): void {
  for (const path of unfinished)
    try {
      rmSync(path, { recursive: true, force: true });
    } catch {
      // What could not be begun cannot be removed either.
    }
  unfinished.clear();
}
