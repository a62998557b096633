const SMALL = ['No', 'One', 'Two', 'Three', 'Four', 'Five', 'Six', 'Seven', 'Eight', 'Nine', 'Ten'];

/** A small number as a word that begins a sentence, a larger one in figures. */
export function countWord(count: number): string {
  return SMALL[count] ?? String(count);
}

/** `1 line`, `3 lines`. */
export function plural(count: number, one: string, many = `${one}s`): string {
  return `${count} ${count === 1 ? one : many}`;
}

/** `line 2`, `lines 2 and 4`, `lines 2, 4 and 5`. */
export function sayLines(numbers: readonly number[]): string {
  if (numbers.length < 2) return `line ${numbers[0] ?? ''}`;
  return `lines ${numbers.slice(0, -1).join(', ')} and ${numbers.at(-1)}`;
}

const OUTCOMES: Record<string, string> = {
  right: 'right',
  carried: 'a carried step, not the first fault',
  'not-first': 'not the first fault',
  missed: 'there was a fault',
  'false-alarm': 'there was no fault',
  'no-pick': 'no step picked',
  void: 'does not count',
  'not-handed-in': 'not handed in',
  excused: 'excused',
};

/** How a finding came out, in the reviewer's own list. */
export function sayOutcome(outcome: string | null): string {
  return (outcome && OUTCOMES[outcome]) || 'not scored';
}

const ORDINALS = ['First', 'Second', 'Third', 'Fourth', 'Fifth', 'Sixth', 'Seventh', 'Eighth'];

/** Names a review by its place on the reviewer's own list. */
export function ordinal(index: number): string {
  return ORDINALS[index] ?? `Number ${index + 1}`;
}
