import type { Random } from "../../support/random.js";
import { extremeNumbers, marks } from "./tokens.js";

/** Texts that were never a good file: bytes, characters of all planes, words in any order. @param words of the format */
export function randomText(random: Random, words: readonly string[]): string {
  const length = random.below(random.below(10) === 0 ? 2000 : 60);
  const many = <T>(make: () => T) => Array.from({ length }, make);
  switch (random.below(4)) {
    case 0:
      return new TextDecoder().decode(Uint8Array.from(many(() => random.below(256))));
    case 1:
      return String.fromCharCode(...many(() => random.below(65536)));
    case 2:
      return String.fromCharCode(...many(() => 32 + random.below(95)));
    default: {
      const token = () => random.pick(random.below(3) === 0 ? marks : random.below(3) === 0 ? extremeNumbers : words);
      const between = random.pick(["", " ", " ", "\n", ", "]);
      return many(token).join(between);
    }
  }
}

/** The words of texts, each once: what a reader of such texts has an ear for. */
export function wordsOf(texts: readonly string[]): readonly string[] {
  const words = new Set(texts.flatMap((text) => text.match(/[^\s,;[\]{}]+/g) ?? []));
  return [...words].filter((word) => word.length < 40);
}
