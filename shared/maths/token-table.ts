/** What a token is to the grammar; a sign or a bracket is its own kind. */
export type TokenKind =
  | 'number'
  | 'letter'
  | 'function'
  | 'log'
  | 'log2'
  | 'exp'
  | 'text'
  | 'end-of-line'
  | 'hole'
  | '+'
  | '-'
  | 'pm'
  | 'mp'
  | '*'
  | 'x'
  | '/'
  | 'div'
  | '^'
  | '_'
  | '!'
  | "'"
  | 'degree'
  | '%'
  | 'raised'
  | '('
  | ')'
  | '['
  | ']'
  | '{'
  | '}'
  | 'set('
  | 'set)'
  | '|'
  | 'open.'
  | 'close.'
  | 'floor('
  | 'floor)'
  | 'ceil('
  | 'ceil)'
  | ','
  | ';'
  | '.'
  | '&'
  | 'newline'
  | ':='
  | ':'
  | '='
  | '<'
  | '>'
  | '<='
  | '>='
  | '!='
  | 'approx'
  | 'frac'
  | 'binom'
  | 'sqrt'
  | 'int'
  | 'sum'
  | 'prod'
  | 'lim'
  | 'to'
  | 'begin'
  | 'end'
  | 'over'
  | 'accent'
  | 'infinity'
  | 'e'
  | 'i'
  | 'top'
  | 'in'
  | 'notin'
  | 'cup'
  | 'cap'
  | 'setminus'
  | 'empty'
  | 'number-set'
  | 'or'
  | 'and'
  | 'forall'
  | 'implies';

/** One kind a line, then the commands that mean it. */
const COMMAND_KINDS = String.raw`
* cdot ast bullet
x times
div div
pm pm
mp mp
/ slash
= eq
< lt
> gt
<= le leq leqslant
>= ge geq geqslant
!= ne neq
approx approx thickapprox
in in isin
notin notin
cup cup
cap cap
setminus setminus smallsetminus backslash
empty varnothing emptyset
number-set R Z N Q C reals Reals integers naturals
or lor vee
and land wedge
forall forall
to to rightarrow longrightarrow
implies Rightarrow implies Longrightarrow Leftrightarrow iff Longleftrightarrow therefore
infinity infty infin
e exponentialE
i imaginaryI imaginaryJ
degree degree circ
top top intercal
' prime
| vert lvert rvert mid
set( lbrace {
set) rbrace }
[ lbrack
] rbrack
( lparen
) rparen
floor( lfloor
floor) rfloor
ceil( lceil
ceil) rceil
frac frac dfrac tfrac cfrac
binom binom dbinom tbinom
sqrt sqrt
int int
sum sum
prod prod
lim lim
log log lg
log2 lb
exp exp
begin begin
end end
over overline bar
accent vec hat tilde mathbf bm boldsymbol
hole placeholder
text text mbox textrm textnormal
: colon
% %
:= coloneq coloneqq
newline \ cr`;

/** Functions of one or more arguments, by TeX command or plain word. */
const FUNCTIONS =
  'sin cos tan cot sec csc arcsin arccos arctan arccot arcsec arccsc sinh cosh tanh coth sech csch arsinh arcosh artanh ' +
  'ln gcd lcm min max arg det';
const FUNCTION_NAMES =
  'cosec=csc tg=tan ctg=cot cotan=cot asin=arcsin acos=arccos atan=arctan arcsinh=arsinh arccosh=arcosh arctanh=artanh ' +
  'asinh=arsinh acosh=arcosh atanh=artanh abs=abs sgn=sign sign=sign floor=floor ceil=ceil Re=re Im=im conj=conj';

const GREEK =
  'alpha beta gamma delta epsilon varepsilon zeta eta theta vartheta iota kappa lambda mu nu xi pi rho sigma varsigma tau ' +
  'upsilon phi varphi chi psi omega Gamma Delta Theta Lambda Xi Pi Sigma Upsilon Phi Psi Omega ell hbar partial';

export const SKIPPED = new Set(
  'displaystyle textstyle scriptstyle limits nolimits mathstrut strut nonumber'.split(' '),
);
export const SPACES = new Set(', : ; > quad qquad thinspace enspace enskip medspace thickspace'.split(' '));
export const LETTER_STYLES = new Set('mathrm operatorname mathit mathsf textup rm'.split(' '));

const FUNCTION_OF = new Map<string, string>();
for (const name of FUNCTIONS.split(' ')) FUNCTION_OF.set(name, name);
for (const pair of FUNCTION_NAMES.split(' ')) {
  const [word = '', name = ''] = pair.split('=');
  if (name) FUNCTION_OF.set(word, name);
}

/** The function that a command or plain word names, if any. */
export function functionOf(word: string): string | undefined {
  return FUNCTION_OF.get(word);
}

/** Command name (no backslash) to its kind. */
export const COMMANDS: ReadonlyMap<string, TokenKind> = commandTable();

function commandTable(): ReadonlyMap<string, TokenKind> {
  const table = new Map<string, TokenKind>();
  for (const entry of COMMAND_KINDS.trim().split('\n')) {
    const [kind, ...names] = entry.split(' ');
    for (const name of names) table.set(name, kind as TokenKind);
  }
  for (const name of GREEK.split(' ')) table.set(name, 'letter');
  for (const word of FUNCTION_OF.keys()) table.set(word, 'function');
  return table;
}

/** Single characters, typed or pasted, to their kind. */
export const CHARACTERS: ReadonlyMap<string, TokenKind> = new Map<string, TokenKind>([
  ...[..."+-*/^_!'()[]{}|,;.&=<>:%"].map((char): [string, TokenKind] => [char, char as TokenKind]),
  ['×', 'x'],
  ['·', '*'],
  ['⋅', '*'],
  ['∗', '*'],
  ['÷', 'div'],
  ['−', '-'],
  ['–', '-'],
  ['±', 'pm'],
  ['∓', 'mp'],
  ['≤', '<='],
  ['≥', '>='],
  ['⩽', '<='],
  ['⩾', '>='],
  ['≠', '!='],
  ['≈', 'approx'],
  ['∞', 'infinity'],
  ['°', 'degree'],
  ['′', "'"],
  ['’', "'"],
  ['√', 'sqrt'],
  ['∫', 'int'],
  ['∑', 'sum'],
  ['∏', 'prod'],
  ['∈', 'in'],
  ['∉', 'notin'],
  ['∪', 'cup'],
  ['∩', 'cap'],
  ['∖', 'setminus'],
  ['∅', 'empty'],
  ['→', 'to'],
  ['∨', 'or'],
  ['∧', 'and'],
  ['∀', 'forall'],
  ['⇒', 'implies'],
  ['⇔', 'implies'],
  ['∴', 'implies'],
  ['∣', '|'],
  ['ℝ', 'number-set'],
  ['ℤ', 'number-set'],
  ['ℕ', 'number-set'],
  ['ℚ', 'number-set'],
  ['ℂ', 'number-set'],
]);

/** Greek typed as such. */
export const GREEK_CHARACTERS: ReadonlyMap<string, string> = new Map(
  [...'αβγδεζηθικλμνξπρστυφχψωΓΔΘΛΞΠΣΦΨΩ∂'].map((char, at) => [
    char,
    '\\' +
      (
        'alpha beta gamma delta varepsilon zeta eta theta iota kappa lambda mu nu xi pi rho sigma tau upsilon varphi chi psi ' +
        'omega Gamma Delta Theta Lambda Xi Pi Sigma Phi Psi Omega partial'
      ).split(' ')[at],
  ]),
);

export const RAISED_DIGITS = '⁰¹²³⁴⁵⁶⁷⁸⁹';
export const VULGAR_FRACTIONS: ReadonlyMap<string, string> = new Map(
  '½=1/2 ⅓=1/3 ⅔=2/3 ¼=1/4 ¾=3/4 ⅕=1/5 ⅖=2/5 ⅗=3/5 ⅘=4/5 ⅙=1/6 ⅚=5/6 ⅛=1/8 ⅜=3/8 ⅝=5/8 ⅞=7/8'
    .split(' ')
    .map((pair): [string, string] => [pair.slice(0, 1), pair.slice(2)]),
);
