import { renderToString } from 'katex';

interface MathsKey {
  /** What the key shows, as TeX. */
  readonly face: string;
  readonly name: string;
  /** What it puts in; `#@` takes what stands before, `#0` the selection, `#?` an empty place. */
  readonly inserts: string;
}

const KEYS: readonly MathsKey[] = [
  { face: '\\frac{a}{b}', name: 'fraction', inserts: '\\frac{#@}{#?}' },
  { face: 'x^{2}', name: 'power', inserts: '#@^{#?}' },
  { face: '\\sqrt{x}', name: 'square root', inserts: '\\sqrt{#0}' },
  { face: '(\\;)', name: 'brackets', inserts: '\\left(#0\\right)' },
  { face: '\\pi', name: 'pi', inserts: '\\pi' },
  { face: '=', name: 'equals', inserts: '=' },
  { face: '\\ne', name: 'not equal', inserts: '\\ne' },
  { face: '\\pm', name: 'plus or minus', inserts: '\\pm' },
];
const FACES = KEYS.map(({ face }) => ({ __html: renderToString(face, { throwOnError: false, output: 'html' }) }));

/** The keys under the field in hand; they never take the focus away from it. */
export function MathsFieldKeys({ onPress }: { readonly onPress: (inserts: string) => void }) {
  return (
    <fieldset className="maths-field-keys slate" aria-label="Maths keys">
      {KEYS.map((key, i) => (
        <button
          key={key.name}
          type="button"
          tabIndex={-1}
          aria-label={key.name}
          onPointerDown={(event) => event.preventDefault()}
          onMouseDown={(event) => event.preventDefault()}
          onClick={() => onPress(key.inserts)}
          dangerouslySetInnerHTML={FACES[i]}
        />
      ))}
    </fieldset>
  );
}
