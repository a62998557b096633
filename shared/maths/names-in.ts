/** The names of all letters in some part of a reading, bound ones too; quick, for the reader's own questions. */
export function namesIn(part: unknown, into: Set<string> = new Set()): Set<string> {
  if (typeof part !== 'object' || part === null) return into;
  if ('kind' in part && part.kind === 'letter' && 'name' in part && typeof part.name === 'string') into.add(part.name);
  for (const key in part) if (key !== 'span' && key !== 'bracketed') namesIn(part[key as keyof typeof part], into);
  return into;
}
