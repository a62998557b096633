import { Fragment } from 'react';
import { Maths } from '../../ui/maths.tsx';
import type { Sentence } from './verdict-words.ts';

/** A sentence with its maths set as maths. */
export function Words({ sentence }: { readonly sentence: Sentence }) {
  return sentence.map((part, i) => (
    <Fragment key={i}>{typeof part === 'string' ? part : <Maths tex={part.tex} />}</Fragment>
  ));
}
