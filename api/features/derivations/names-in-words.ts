/** Parts of names shorter than this are too common in words to warn about. */
const SHORTEST_PART = 3;

/**
 * The words of an author that are part of a name on the class list, as the author wrote them and no more: a first name
 * that is typed must not tell the surname. Letters' case and marks do not matter. It is a warning only: a part may also
 * be an ordinary word.
 */
export function namesInWords(names: readonly string[], words: readonly string[]): string[] {
  const parts = new Set(
    names.flatMap((name) => wordsOf(name).map(plain)).filter((part) => part.length >= SHORTEST_PART),
  );
  return [...new Set(words.flatMap(wordsOf))].filter((word) => parts.has(plain(word)));
}

/** What stands in braces of a line: words are set there, as in \text{by Ana}. */
export function wordsInTex(tex: string): string[] {
  return [...tex.matchAll(/\{([^{}]*)\}/g)].map(([, words = '']) => words);
}

function wordsOf(text: string): string[] {
  return text.match(/[\p{L}\p{M}\p{N}]+/gu) ?? [];
}

function plain(word: string): string {
  return word.normalize('NFD').replace(/\p{M}/gu, '').toLowerCase();
}
