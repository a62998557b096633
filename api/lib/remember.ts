/** Keeps the answers for the `most` keys asked for last; one that failed is asked for again. */
export function remember<Answer>(most: number): (key: string, ask: () => Promise<Answer>) => Promise<Answer> {
  const known = new Map<string, Promise<Answer>>();
  return async (key, ask) => {
    const answer = known.get(key) ?? ask();
    known.delete(key);
    known.set(key, answer);
    const [oldest] = known.keys();
    if (known.size > most && oldest !== undefined) known.delete(oldest);
    try {
      return await answer;
    } catch (error) {
      known.delete(key);
      throw error;
    }
  };
}
