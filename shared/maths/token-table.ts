/**
 * What a token is to the grammar: one character, so that the kinds of a line can be searched like text. A sign or a
 * bracket is its own kind, whichever way it was typed; the others are:
 * `0` number, `a` letter, `e` and `i` constants, `o` infinity, `f` function, `l` logarithm, `L` limit, `F` fraction,
 * `C` binomial, `r` root, `O` overline, `2` raised digits, `±` a double sign, `<` a relation other than `=`, `d` is
 * defined as, `∈` in or not in, `U` a join of sets, `R` a named set, `s` and `z` the braces of a set, `V` or and and,
 * `∑` sum or product, `p` and `q` what opens and closes maths in a text, `T` words, `B` and `E` begin and end of an environment, `N` new row, `H` empty box, `‹` and `›` a
 * bracket left out with `\left.` and `\right.`, `$` end of the line.
 */
export type TokenKind = string;

/**
 * One kind a line, with the text of its tokens after `@`, then the commands and characters that mean it; `a@b`: the text
 * of a is b. Without an `@` the text is the name, and a sign names itself. The kinds that no token has: `~` a gap,
 * `S` without meaning, `A` an accent, `M` a letter style, `X` an adornment, `D` blackboard letters, `n` a negated sign,
 * `h` a space of some width, `v` what stands between the parts of a fraction or binomial in one group.
 */
const ROWS = String.raw`*@dot * cdot ast bullet · ⋅ ∗
*@times × times
/@slash / slash
/@divide ÷ div
+@plus +
-@minus - − –
±@plusminus ± pm
±@minusplus ∓ mp
^ **
_
!
=@= = eq ==
<@< < lt
<@> > gt
<@<= <= ≤ le leq leqslant ⩽
<@>= >= ≥ ge geq geqslant ⩾
<@!= ≠ ne neq \not=
<@approx ≈ approx thickapprox simeq ≃ doteq fallingdotseq ≒
∈ in isin
∈@! ∉ notin \not\in
U@union ∪ cup
U@intersection ∩ cap
U@without ∖ setminus smallsetminus backslash
R@empty ∅ varnothing emptyset
R@reals R reals Reals ℝ
R@integers Z integers ℤ
R@naturals N naturals ℕ
R@rationals Q ℚ
R@complex C ℂ
V@or or ∨ lor vee
V@and and ∧ land wedge
∀@all ∀ forall
→ to rightarrow longrightarrow ->
⇒ implies Rightarrow Longrightarrow iff Leftrightarrow Longleftrightarrow therefore => ⇔ ∴
o@infinity ∞ infty infin infinity
e@e exponentialE
i@i imaginaryI imaginaryJ
° degree circ
⊤ top intercal
' prime ′ ’
| vert lvert rvert mid ∣
s lbrace \{
z rbrace \}
{
}
[ lbrack
] rbrack
( lparen
) rparen
⌊@floor ⌊ lfloor
⌋ rfloor
⌈@ceil ⌈ lceil
⌉ rceil
,
;
.
&
: colon
d := ≔ coloneq coloneqq
% \%
F frac dfrac tfrac cfrac
C binom dbinom tbinom
v@F over
v@C choose
p \( \[
q \) \]
r sqrt √@
∫ int
∑ sum ∑@sum prod@product ∏@product
L lim
l log lg lb
O overline bar
B begin
E end
N cr \\
H placeholder
T text mbox textrm textnormal
A vec overrightarrow hat tilde mathbf bm boldsymbol
M mathrm operatorname mathit mathsf textup rm
X boxed fbox cancel bcancel xcancel underline
D mathbb
S $ \! displaystyle textstyle scriptstyle limits nolimits mathstrut strut nonumber checkmark ✓
~ \, \: \; \> quad qquad thinspace enspace enskip medspace thickspace
h hspace mspace color
n not
f sin cos tan cot sec csc arcsin arccos arctan arccot arcsec arccsc sinh cosh tanh coth sech csch arsinh arcosh artanh
f ln exp gcd lcm min max arg det abs sign floor ceil conj Re@re Im@im sgn@sign cosec@csc tg@tan ctg@cot cotan@cot
f arctg@arctan arcctg@arccot sh@sinh ch@cosh th@tanh cth@coth arsh@arsinh arch@arcosh arth@artanh
f asin@arcsin acos@arccos atan@arctan arcsinh@arsinh arccosh@arcosh arctanh@artanh asinh@arsinh acosh@arcosh atanh@artanh
a epsilon vartheta phi ell hbar partial ∂@\partial differentialD@d`;

/** The Greek letters in the order of their characters, by the commands that show them. */
const GREEK =
  'alpha beta gamma delta varepsilon zeta eta theta iota kappa lambda mu nu xi omicron pi rho varsigma sigma tau upsilon varphi chi psi omega';

/** What a command or character is, and the text that its token carries. */
export interface Entry {
  readonly kind: TokenKind;
  readonly text: string;
}

const TABLE = new Map<string, Entry>();

/** A name of letters is a command; a sign stands for itself. */
const addName = (kind: TokenKind, name: string, text: string): unknown =>
  TABLE.set(isLetter(name) ? `\\${name}` : name, { kind, text });

/** Is the first character a letter of the alphabet? */
const isLetter = (text: string): boolean => /^[a-z]/i.test(text);

for (const row of ROWS.split('\n')) {
  const [head = '', ...names] = row.split(' ');
  const [kind = '', shared] = head.split('@');
  if (shared === undefined && !isLetter(kind)) names.push(kind);
  for (const entry of names) {
    const [name = '', text = shared ?? (kind === 'a' ? `\\${name}` : name)] = entry.split('@');
    addName(kind, name, text);
  }
}

for (const [place, small] of GREEK.split(' ').entries()) {
  const char = String.fromCharCode(945 + place);
  const capital = small.replace('var', '').replace(/^./, (first) => first.toUpperCase());
  for (const name of [small, char]) addName('a', name, `\\${small}`);
  for (const name of [capital, char.toUpperCase()]) addName('a', name, `\\${capital}`);
}

/** Looks up a command with its backslash, or a sign of one or two characters. */
export const findEntry = (name: string): Entry | undefined => TABLE.get(name);

/** Functions (but for the shortest names), roots, or, and; pi and longer Greek letters; infinity. All else needs its backslash. */
const WORD = /^(?:[flrV](?!lb$|(?:ar|c)?[sct]h$)|api$|a(?!hbar).{4}|oinf.{5})/;

/** Looks up what is a word without its backslash. */
export const findWord = (word: string): Entry | undefined => {
  const entry = findEntry(`\\${word}`);
  return entry && WORD.test(entry.kind + word) ? entry : undefined;
};

/** The function that a command or plain word names, if any. */
export const functionOf = (word: string): string | undefined => {
  const entry = findEntry(`\\${word}`);
  return entry?.kind === 'f' ? entry.text : undefined;
};

/** Would these letters, printed side by side, be read as a word? */
export const hidesWord = (letters: string): boolean => {
  for (let from = 0; from < letters.length; from += 1) {
    for (let to = from + 2; to <= Math.min(letters.length, from + 8); to += 1) {
      const part = letters.slice(from, to);
      if (part === 'let' || findWord(part)) return true;
    }
  }
  return false;
};
