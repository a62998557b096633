import { Fragment } from 'react';
import { Maths } from '../../ui/maths.tsx';
import type { Sentence } from '../../../shared/lib/step-words.ts';

const SHORT_TEX = 40;

/** A sentence with its maths set as maths; a stop or comma stays with the maths before it. */
export function Words({ sentence }: { readonly sentence: Sentence }) {
  return sentence.map((part, i) => {
    const before = sentence[i - 1];
    const next = sentence[i + 1];
    if (typeof part === 'string') {
      const isCut = typeof before === 'object' && stopOf(part) !== '' && before.tex.length <= SHORT_TEX;
      return <Fragment key={i}>{isCut ? part.slice(1) : part}</Fragment>;
    }
    const stop = typeof next === 'string' ? stopOf(next) : '';
    if (stop === '' || part.tex.length > SHORT_TEX) return <Maths key={i} tex={part.tex} />;
    return (
      <span key={i} className="whitespace-nowrap">
        <Maths tex={part.tex} />
        {stop}
      </span>
    );
  });
}

function stopOf(words: string): string {
  return /^[.,:;]/.exec(words)?.[0] ?? '';
}
