import { peek } from './reader.ts';

/**
 * The bracket that opens some tokens ahead: the kinds directly within it, nested brackets left empty, and where it ends.
 * Where it is not closed, that is at the end of the line.
 */
export const groupAhead = (from = 0): { readonly inner: string; readonly end: number } => {
  let depth = 0;
  let inner = '';
  for (let end = from; ; end += 1) {
    const { kind } = peek(end);
    if (')]}z⌋⌉'.includes(kind)) depth -= 1;
    if (kind === '$' || (depth <= 0 && end > from)) return { inner, end };
    if (depth === 1) inner += kind;
    if ('([{s⌊⌈'.includes(kind)) depth += 1;
  }
};
