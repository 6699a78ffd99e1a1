import { describe, expect, test } from "vitest";
import { keepFailure } from "./failures.js";
import { targets } from "./targets.js";
import { inputOf, tryInput } from "./try-input.js";

/** `npm run fuzz` goes on from here with as many inputs as are wanted. */
const seed = 20_261_204;

describe(`spoilt inputs, seed ${seed}`, { timeout: 120_000 }, () => {
  test.each(targets.map((target) => [target.name, target] as const))("%s", async (name, target) => {
    const failures: string[] = [];
    for (let number = 0; number < target.few; number += 1) {
      const input = inputOf(target, seed, number);
      const { fault } = await tryInput(target, input);
      if (fault !== null) failures.push(`${keepFailure({ target: name, seed, number, fault, input })}\n${fault}`);
    }
    expect(failures).toEqual([]);
  });
});
