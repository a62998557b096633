import type { MathfieldElement } from 'mathlive';
import { algebraKeyboard } from './maths-field-keyboard.ts';

export type MathsFieldElement = MathfieldElement;
export type MathsFieldClass = typeof MathfieldElement;

let loading: Promise<MathsFieldClass> | null = null;

/** Loads the editing library once, with all its files from this site; a failed load may be tried again. */
export function loadMathsFields(): Promise<MathsFieldClass> {
  loading ??= load().catch((error: unknown) => {
    loading = null;
    throw error;
  });
  return loading;
}

async function load(): Promise<MathsFieldClass> {
  const [library] = await Promise.all([import('mathlive'), import('mathlive/fonts.css')]);
  const element: MathsFieldClass | undefined = library.MathfieldElement;
  if (!element) throw new Error('There is no document to put maths fields into');
  // Without these the library asks for fonts and sounds at addresses that do not exist.
  element.fontsDirectory = null;
  element.soundsDirectory = null;
  element.plonkSound = null;
  element.keypressSound = null;
  element.keypressVibration = false;
  // A caret at the end of its line would otherwise open the device's sound, to play nothing.
  element.playSound = () => Promise.resolve();
  const keyboard = window.mathVirtualKeyboard;
  keyboard.layouts = algebraKeyboard;
  keyboard.editToolbar = 'none';
  keyboard.addEventListener('geometrychange', () => {
    // The keys cover the foot of the page: make room, so that the line being written can be scrolled above them.
    document.documentElement.style.setProperty('--keys-height', `${keyboard.boundingRect.height}px`);
  });
  return element;
}

/** Typed words that mean something else in school algebra than they do to the library. */
const LEFT_OUT = [
  'ii',
  'jj',
  'ee',
  'mm',
  'cm',
  'km',
  'kg',
  'ft',
  'inch',
  'mi',
  'oo',
  'grad',
  'del',
  'AA',
  'EE',
  '!EE',
  '&&',
  '::',
  '?=',
  '(:',
  ':)',
  '(.)',
  '(+)',
  '(/)',
  '(*)',
  '(-)',
  'th',
  'sh',
  'ch',
  'mean',
  'median',
  'fft',
  'bessel',
  'erf',
  'erfc',
  'randomReal',
  'randomInteger',
  '||',
  ':.',
  'nabla',
  'xx',
  '∆',
  '∂',
  '<<',
  '>>',
  '¬',
  ':=',
  'µ',
  'Ω',
];
const READ_AS_TYPED = {
  dx: 'dx',
  dy: 'dy',
  dt: 'dt',
  log: '\\log',
  int: '\\int',
  lim: '\\lim_{#?\\to #?}',
  nosolution: '\\text{no solution}',
  nosolutions: '\\text{no solution}',
};

/** A field set up for one line of school maths. */
export function makeMathsField(element: MathsFieldClass): MathsFieldElement {
  const field = new element();
  field.smartSuperscript = false;
  field.smartMode = false;
  field.smartFence = true;
  field.removeExtraneousParentheses = false;
  field.popoverPolicy = 'off';
  field.environmentPopoverPolicy = 'off';
  field.mathVirtualKeyboardPolicy = 'auto';
  field.letterShapeStyle = 'tex';
  return field;
}

/** What may only be set once the field stands in the document. */
export function settleMathsField(field: MathsFieldElement): void {
  field.menuItems = [];
  const shortcuts = Object.entries(field.inlineShortcuts).filter(([typed]) => !LEFT_OUT.includes(typed));
  field.inlineShortcuts = { ...Object.fromEntries(shortcuts), ...READ_AS_TYPED };
}
