/** An instant for a row that is only ever added to others: now, but always after the one before it. */
export function laterThan(now: Date, before: Date | null | undefined): Date {
  return before && before.getTime() >= now.getTime() ? new Date(before.getTime() + 1) : now;
}
