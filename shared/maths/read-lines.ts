import type { Line, Reading, ReadSettings } from './expression.ts';
import { lettersOf } from './letters.ts';
import { functionsIn, orderSymbols, readInPlace } from './read-in-place.ts';

/** What the lines before a line say to it. */
export interface Place {
  readonly before: readonly Line[];
  /** Names that they introduced as functions. */
  readonly functions: readonly string[];
  /** The same text for places in which every line is read alike. */
  readonly key: string;
}

/** Reads lines one after the other, each in its place behind those before it, as the checker does. */
export function createLineReader(read: (tex: string, place: Place) => Reading): (tex: string) => Reading {
  const functions = new Set<string>();
  const letters = new Set<string>();
  const before: Line[] = [];
  return (tex) => {
    const key = [before.at(-1)?.kind ?? '', [...letters].join(), [...functions].join()].join(' ');
    const reading = read(tex, { before, functions: [...functions, ...orderSymbols(tex, before)], key });
    if (reading.ok) {
      for (const name of functionsIn(reading.line)) functions.add(name);
      for (const name of lettersOf(reading.line)) letters.add(name);
      before.push(reading.line);
    }
    return reading;
  };
}

/** Lines read one after the other. */
export function readLines(lines: readonly string[], settings: Omit<ReadSettings, 'functions'>): Reading[] {
  return lines.map(
    createLineReader((tex, { before, functions }) => readInPlace(tex, { ...settings, functions }, before)),
  );
}
