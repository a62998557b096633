/** Parts of names shorter than this are too common in words to warn about. */
const SHORTEST_PART = 3;

/**
 * The names of a class list that stand in an author's words, by whole name or by one of its parts. Letters' case and
 * marks do not matter. It is a warning only: a part may also be an ordinary word.
 */
export function namesInWords(names: readonly string[], words: readonly string[]): string[] {
  const text = ` ${plain(words.join(' '))} `;
  return names.filter((name) => partsOf(name).some((part) => text.includes(` ${part} `)));
}

function partsOf(name: string): string[] {
  return plain(name)
    .split(' ')
    .filter((part) => part.length >= SHORTEST_PART);
}

function plain(text: string): string {
  return text
    .normalize('NFD')
    .replace(/\p{M}/gu, '')
    .toLowerCase()
    .replace(/[^\p{L}\p{N}]+/gu, ' ')
    .trim();
}
