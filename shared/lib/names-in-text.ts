const LEAST_LETTERS = 3;

function fold(text: string): string {
  return text.normalize('NFD').replaceAll(/\p{M}/gu, '').toLocaleLowerCase('en');
}

/**
 * Names of the class list that a text seems to hold, as they stand in it. Looks for each part of a name of three
 * letters or more as a word with a capital ("mark the term" is nobody).
 */
export function namesInText(text: string, names: readonly string[]): string[] {
  const parts = new Set(
    names
      .flatMap((name) => name.split(/[^\p{L}\p{M}]+/u))
      .filter((part) => part.length >= LEAST_LETTERS)
      .map(fold),
  );
  const words = text.match(/\p{Lu}[\p{L}\p{M}]+/gu) ?? [];
  return [...new Set(words.filter((word) => parts.has(fold(word)) || parts.has(fold(word).replace(/s$/, ''))))];
}
