const segment = (id: string) => encodeURIComponent(id);

/** Every address of the client; links are made from these only. */
export const paths = {
  signIn: (next?: string) => (next ? `/signin?next=${encodeURIComponent(next)}` : '/signin'),
  signUp: (code?: string) => (code ? `/signup?code=${encodeURIComponent(code)}` : '/signup'),
  join: (token: string) => `/join/${segment(token)}`,
  askReset: () => '/reset',
  reset: (token: string) => `/reset/${segment(token)}`,
  account: () => '/account',
  today: () => '/',
  classes: () => '/classes',
  class: (classId: string) => `/classes/${segment(classId)}`,
  tasks: () => '/tasks',
  task: (taskId: string) => `/tasks/${segment(taskId)}`,
  newRound: (from: { taskId?: string; classId?: string } = {}) => withSearch('/rounds/new', from),
  round: (roundId: string) => `/rounds/${segment(roundId)}`,
  write: (roundId: string) => `/rounds/${segment(roundId)}/write`,
  review: (reviewId: string) => `/reviews/${segment(reviewId)}`,
  derivation: (derivationId: string) => `/derivations/${segment(derivationId)}`,
  disputes: (disputeId?: string) => withSearch('/disputes', { case: disputeId }),
  standings: (classId?: string) => withSearch('/standings', { class: classId }),
  admin: () => '/admin',
  mailbox: () => '/mailbox',
  parts: () => '/parts',
  help: (topic?: string) => (topic ? `/help#${encodeURIComponent(topic)}` : '/help'),
};

function withSearch(path: string, values: Readonly<Record<string, string | undefined>>): string {
  const search = new URLSearchParams();
  for (const [name, value] of Object.entries(values)) if (value) search.set(name, value);
  const query = search.toString();
  return query ? `${path}?${query}` : path;
}
