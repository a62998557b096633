import type { VirtualKeyboardKeycap, VirtualKeyboardLayout } from 'mathlive';

type Key = string | Partial<VirtualKeyboardKeycap>;

const back: Key = { label: '[backspace]', width: 1.5, class: 'action' };
const left: Key = '[left]';
const right: Key = '[right]';
const next: Key = {
  label: '↵',
  command: ['performWithFeedback', 'commit'],
  width: 1.5,
  class: 'action',
  tooltip: 'Next line',
};

const fraction: Key = { latex: '\\frac{#@}{#?}', class: 'small', tooltip: 'fraction' };
const power: Key = { latex: '#@^{#?}', tooltip: 'power' };
const square: Key = { latex: '#@^2', tooltip: 'squared' };
const root: Key = { latex: '\\sqrt{#0}', tooltip: 'square root' };
const otherRoot: Key = { latex: '\\sqrt[#?]{#0}', tooltip: 'other root' };
const bars: Key = { latex: '\\left|#0\\right|', tooltip: 'absolute value' };

function lettersOf(row: string): Key[] {
  return [...row].map((letter) => ({ latex: letter, shift: { latex: letter.toUpperCase() } }));
}

/** One set of keys for every field: figures and operations first, then letters, then functions. */
export const algebraKeyboard: VirtualKeyboardLayout[] = [
  {
    label: '123',
    id: 'slip-algebra',
    tooltip: 'Figures and operations',
    rows: [
      ['x', 'y', '7', '8', '9', '\\div', fraction, power],
      ['a', 'b', '4', '5', '6', '\\cdot', square, root],
      ['(', ')', '1', '2', '3', '-', '=', '\\pm'],
      [{ latex: '<', shift: '\\le' }, { latex: '>', shift: '\\ge' }, '0', '[.]', '\\pi', '+', left, right],
      ['[shift]', '\\ne', '\\le', '\\ge', back, next],
    ],
  },
  {
    label: 'abc',
    id: 'slip-letters',
    tooltip: 'Letters',
    rows: [
      lettersOf('qwertyuiop'),
      lettersOf('asdfghjkl'),
      ['[shift]', ...lettersOf('zxcvbnm'), back],
      ['\\alpha', '\\beta', '\\theta', '\\lambda', '\\pi', { latex: '#@_{#?}', tooltip: 'index' }, left, right, next],
    ],
  },
  {
    label: '<i>f</i>',
    id: 'slip-functions',
    tooltip: 'Functions',
    rows: [
      ['\\sin', '\\cos', '\\tan', '\\ln', '\\log', { latex: '\\log_{#?}' }, '\\exp'],
      [otherRoot, bars, { latex: '\\frac{d}{dx}' }, { latex: '\\int' }, { latex: '\\int_{#?}^{#?}' }, '\\infty', '!'],
      ['\\in', '\\cup', '\\emptyset', '\\mathbb{R}', '\\{', '\\}', ';'],
      ['\\lor', '\\land', '\\approx', left, right, back, next],
    ],
  },
];
