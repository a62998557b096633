import { toBonds, type Couple, type DealtPair } from './allocation.ts';
import { pairEvenly } from './balanced-pairs.ts';
import { seededRandom } from './seeded-random.ts';

export interface LaterDerivation {
  readonly author: string;
  readonly reviews: number;
  /** Reviews that are still to be found for it. */
  readonly wants: number;
}

export interface LaterReviewer {
  readonly person: string;
  readonly load: number;
  /** Reviews that are still to be found for this person. */
  readonly wants: number;
  /** Reviews that may be added at most, wanted or not. */
  readonly room: number;
}

export interface LaterInput {
  readonly seed: string;
  readonly derivations: readonly LaterDerivation[];
  readonly reviewers: readonly LaterReviewer[];
  /** What this round has dealt already: never repeated, and not made mutual where avoidable. */
  readonly dealt: readonly DealtPair[];
  readonly banned?: readonly Couple[];
  readonly earlier?: readonly Couple[];
}

const MUTUAL = 2000;
const MET = 100;

/**
 * Adds to a dealing without touching what was dealt: first reviewers for derivations that came late or lost one, the
 * least loaded first; then derivations, the least reviewed first, for reviewers who still want some.
 */
export function allocateLater(input: LaterInput): DealtPair[] {
  const random = seededRandom(input.seed);
  const bonds = toBonds(input.banned, input.earlier);
  const dealt = new Set(input.dealt.map(key));
  const cost = (reviewer: string, author: string) => {
    if (!bonds.isAllowed(reviewer, author) || dealt.has(key({ reviewer, author }))) return null;
    const mutual = dealt.has(key({ reviewer: author, author: reviewer })) ? MUTUAL : 0;
    return mutual + (bonds.haveMet(reviewer, author) ? MET : 0) + Math.floor(random() * 20);
  };
  const pair = (reviewers: readonly LaterReviewer[], derivations: readonly LaterDerivation[], first: boolean) => {
    const found = pairEvenly({
      reviewers: reviewers.map(({ load, room, wants }) => ({ load, most: load + (first ? room : wants) })),
      authors: derivations.map(({ reviews, wants }) => ({
        load: reviews,
        most: reviews + (first ? wants : reviewers.length),
      })),
      cost: (r, a) => cost((reviewers[r] as LaterReviewer).person, (derivations[a] as LaterDerivation).author),
    }).map(([r, a]) => ({
      reviewer: (reviewers[r] as LaterReviewer).person,
      author: (derivations[a] as LaterDerivation).author,
    }));
    for (const each of found) dealt.add(key(each));
    return found;
  };
  const forDerivations = pair(
    input.reviewers,
    input.derivations.filter(({ wants }) => wants > 0),
    true,
  );
  const count = (name: string, of: (pair: DealtPair) => string) => forDerivations.filter((p) => of(p) === name).length;
  const waiting = input.reviewers
    .map((reviewer) => {
      const got = count(reviewer.person, (p) => p.reviewer);
      return { ...reviewer, load: reviewer.load + got, wants: Math.max(0, reviewer.wants - got) };
    })
    .filter(({ wants }) => wants > 0);
  const served = input.derivations.map((each) => ({
    ...each,
    reviews: each.reviews + count(each.author, (p) => p.author),
  }));
  return [...forDerivations, ...pair(waiting, served, false)];
}

function key({ reviewer, author }: DealtPair): string {
  return `${reviewer}>${author}`;
}
