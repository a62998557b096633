import type { Evidence, Note, StepRuling, UndecidedReason, Verdict } from '../schemas/verdict.ts';

/**
 * How a step fares. plain: nothing is known. fault: the first step that does not follow. carried: right for what it was
 * given. also-fails: a further, independent fault. undecided: neither shown to hold nor to fail.
 */
export type StepState = 'plain' | 'holds' | 'fault' | 'carried' | 'undecided' | 'also-fails';

/** Words, with maths as TeX between them. */
export type WordPart = string | { readonly tex: string };
export type Sentence = readonly WordPart[];

/** What is said about one step: how it fares, what shows it, what else was noted, and how that was found. */
export interface StepWords {
  readonly summary: Sentence;
  readonly evidence: readonly Sentence[];
  readonly notes: readonly Sentence[];
  readonly reached: string | null;
}

type Judged = Pick<Verdict, 'firstFault' | 'steps'>;

/** How each step stands along the edge, step 1 first. A fault behind an undecided step is never called the first. */
export function edgeStates({ firstFault, steps }: Judged): StepState[] {
  return steps.map(({ step, ruling }) => {
    if (ruling === 'undecided') return 'undecided';
    if (ruling === 'fails') return step === firstFault ? 'fault' : 'also-fails';
    return firstFault !== null && step > firstFault ? 'carried' : 'holds';
  });
}

/** The verdict in one sentence, as a heading says it. */
export function verdictHeadline({
  outcome,
  firstFault,
  steps,
}: Pick<Verdict, 'outcome' | 'firstFault' | 'steps'>): string {
  if (outcome === 'faulty') return `The first fault is step ${firstFault}.`;
  if (outcome === 'sound') return 'Every step follows.';
  const open = steps.filter(({ ruling }) => ruling === 'undecided').map(({ step }) => step);
  if (open.length === 1) return `Step ${open[0]} is undecided.`;
  return open.length === 0 ? 'This derivation is undecided.' : `Steps ${listed(open.map(String))} are undecided.`;
}

/** One step in words that can be checked by hand. */
export function stepWords(ruling: StepRuling, state: StepState): StepWords {
  const { evidence, notes } = ruling;
  // A value that is listed and never rejected is held against the given, not against the line above, which it solves.
  const other = notes.includes('not-rejected') ? 'the given' : 'the line above';
  return {
    summary: SUMMARIES[state](ruling.step),
    evidence: [
      ...witnessWords(evidence, other),
      ...solutionWords(evidence, other),
      ...wrongPartWords(evidence),
      ...mendWords(evidence),
      ...undecidedWords(evidence),
    ],
    notes: [...notes.map((note) => noteWords(note, evidence)), ...excludedWords(evidence, notes)],
    reached: ruling.reached && REACHED[ruling.reached],
  };
}

const tex = (source: string): WordPart => ({ tex: source });

const SUMMARIES: Record<StepState, (step: number) => Sentence> = {
  plain: (step) => [`Step ${step}.`],
  holds: (step) => [`Step ${step} follows.`],
  fault: (step) => [`Step ${step} is the first that does not follow.`],
  carried: (step) => [`Step ${step} follows from its own line above, which carries the fault on.`],
  'also-fails': (step) => [`Step ${step} does not follow either, whatever stands above it.`],
  undecided: (step) => [`Step ${step} could be shown neither to follow nor to fail. The teacher decides.`],
};

const REACHED: Record<'proved' | 'sampled', string> = {
  proved: 'Found by exact algebra.',
  sampled: 'Found by agreement to many digits at many points, which is not a proof.',
};

function witnessWords({ witness, link }: Evidence, other: string): Sentence[] {
  if (!witness) return [];
  const place = placeWords(witness.at);
  const where: Sentence = link ? [...place, `, in part ${link} of this line`] : place;
  if (isTruth(witness.above) || isTruth(witness.below)) {
    return [[...where, ` ${other} is ${truthWord(witness.above)}, this one is ${truthWord(witness.below)}.`]];
  }
  return [[...where, ` ${other} is `, tex(witness.above), ', this one is ', tex(witness.below), '.']];
}

function placeWords(at: Readonly<Record<string, string>>): Sentence {
  const values = Object.entries(at);
  if (values.length === 0) return ['As it stands,'];
  return ['At ', ...between(values.map(([letter, value]) => tex(`${letter}=${value}`)))];
}

const isTruth = (value: string) => value === 'true' || value === 'false';
const truthWord = (value: string) => (value === 'true' ? 'true' : 'not true');

function solutionWords({ lost, gained, solutions, operation }: Evidence, other: string): Sentence[] {
  const words: Sentence[] = [];
  if (lost?.length) {
    words.push([
      ...between(lost.map(tex)),
      lost.length === 1
        ? ` solves ${other}, but not this one: it was lost.`
        : ` solve ${other}, but not this one: they were lost.`,
    ]);
  }
  if (gained?.length) {
    words.push([
      ...between(gained.map(tex)),
      gained.length === 1
        ? ` solves this line, but not ${other}: it was gained.`
        : ` solve this line, but not ${other}: they were gained.`,
    ]);
  }
  if (operation) words.push([OPERATIONS[operation]]);
  // Where solutions were gained, they have been named already.
  if (solutions && lost?.length && !gained?.length) words.push(['The solutions of this line: ', tex(solutions), '.']);
  return words;
}

const OPERATIONS: Record<NonNullable<Evidence['operation']>, string> = {
  power: 'Raising both sides to one power can bring in solutions.',
  multiply: 'Multiplying both sides by something that can be zero can bring in solutions.',
  logarithm: 'Combining or removing logarithms can bring in solutions.',
  removed: 'What was removed had no value everywhere, so solutions can come in.',
  differentiate: 'Differentiating both sides can bring in solutions.',
};

function wrongPartWords({ wrongPart, difference }: Evidence): Sentence[] {
  const words: Sentence[] = [];
  if (wrongPart)
    words.push(['Where this line has ', tex(wrongPart.is), ', ', tex(wrongPart.shouldBe), ' would follow.']);
  if (difference) words.push(['The line above minus this one leaves ', tex(difference), '.']);
  return words;
}

function mendWords({ mended, slip, meant }: Evidence): Sentence[] {
  const words: Sentence[] = [];
  if (mended) words.push(['Nearest to what was written, this would follow: ', tex(mended.line), '.']);
  if (slip) words.push([`What likely happened: ${slipWords(slip.id)}.`]);
  if (meant) words.push(['What was meant, with its brackets: ', tex(meant), '.']);
  return words;
}

/** A named slip in plain words. Ids are written as words joined by hyphens, so that they can be read out. */
export function slipWords(id: string): string {
  return id.replaceAll('-', ' ');
}

function undecidedWords({ reason, error }: Evidence): Sentence[] {
  if (error) {
    const line = error.line === 0 ? 'The given' : `Line ${error.line}`;
    const found = error.found?.replace(/\\text\{([^}]*)\}/g, '$1').trim();
    return [[`${line} could not be read${found ? ` at “${found}”` : ''}.`]];
  }
  return reason ? [[REASONS[reason]]] : [];
}

const REASONS: Record<UndecidedReason, string> = {
  'not-read': 'A line of this step could not be read.',
  'not-covered': 'The checker does not rule on this kind of line.',
  'change-of-kind': 'The line above and this line are of different kinds, so neither can be compared with the other.',
  'no-unknown': 'It is not clear which letter is sought.',
  'no-domain': 'There is no range of values on which the lines could be compared.',
  limit: 'The lines are too large to be decided.',
  time: 'It took too long to decide.',
  'not-settled': 'Neither a proof nor a counterexample was found.',
  'no-agreed-meaning': 'A part of the line has no agreed meaning.',
};

function noteWords(note: Note, { meant }: Evidence): Sentence {
  if (note === 'presentation' && meant)
    return ['The brackets that were meant are missing on paper; the step is counted as meant.'];
  return [NOTES[note]];
}

const NOTES: Record<Note, string> = {
  'given-miscopied': 'The first line differs from the given.',
  domain: 'This line has a value in fewer places than the line above; from here on only those count.',
  constant: 'A constant of integration is missing.',
  'one-way': 'This step goes one way only: what is found has to be tried in the given.',
  presentation: 'It is written in a way that says something else than was meant.',
  empty: 'Both lines have no solution, or both are always true.',
  meaningless: 'This line has no value anywhere.',
  unfinished: 'All steps stand, but the goal is not reached yet.',
  candidates: 'The values listed here are candidates; those that do not solve the given have to be rejected.',
  'not-rejected': 'A value listed here does not solve the given and is never rejected.',
  remark: 'A remark: true, and the next step starts from the line before it.',
  cases: 'The cases are read as one line, joined by “or”.',
  definition: 'A definition: later lines may use it.',
  continued: 'This line goes on from the line above.',
};

function excludedWords({ excluded }: Evidence, notes: readonly Note[]): Sentence[] {
  if (!excluded?.length || !notes.includes('domain')) return [];
  return [['Here it has to be said that ', ...between(excluded.map(tex)), '.']];
}

/** Parts with commas between them and "and" before the last. */
function between(parts: readonly WordPart[]): WordPart[] {
  return parts.flatMap((part, i) => {
    if (i === 0) return [part];
    return [i === parts.length - 1 ? ' and ' : ', ', part];
  });
}

function listed(words: readonly string[]): string {
  return between(words).join('');
}
