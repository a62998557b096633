/** The names of all letters in some part of a reading, bound ones too; quick, for the reader's own questions. */
export const namesIn = (part: unknown, into: Set<string> = new Set()): Set<string> => {
  if (!isRecord(part)) return into;
  if (part['kind'] === 'letter') into.add(String(part['name']));
  for (const key in part) if (key !== 'span' && key !== 'bracketed') namesIn(part[key], into);
  return into;
};

const isRecord = (value: unknown): value is Readonly<Record<string, unknown>> =>
  typeof value === 'object' && value !== null;
