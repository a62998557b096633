/**
 * What a token is to the grammar: one character, so that the kinds of a line can be searched like text. A sign or a
 * bracket is its own kind, whichever way it was typed; the others are:
 * `0` number, `a` letter, `e` and `i` constants, `f` function, `l` logarithm, `L` limit, `F` fraction, `C` binomial,
 * `O` overline, `T` words, `B` and `E` begin and end of an environment, `N` new row, `H` empty box, `²` raised digits,
 * `⦃` and `⦄` braces of a set, `‹` and `›` a bracket left out with `\left.` and `\right.`, `ℝ` a set of numbers,
 * `≔` is defined as, `$` end of the line.
 */
export type TokenKind = string;

/**
 * One kind a line, then the commands and characters that mean it; `a@b`: a means b. The kinds that no token has: `~` a gap,
 * `S` without meaning, `A` an accent, `M` a letter style, `X` an adornment, `D` blackboard letters, `n` a negated sign,
 * `h` a space of some width.
 */
const ROWS = String.raw`
* cdot ast bullet · ⋅ ∗
× times
÷ div
± pm
∓ mp
+
- − –
/ slash
^ **
_
!
= eq ==
< lt
> gt
≤ le leq leqslant <= ⩽
≥ ge geq geqslant >= ⩾
≠ ne neq
≈ approx thickapprox
∈ in isin
∉ notin
∪ cup
∩ cap
∖ setminus smallsetminus backslash
∅ varnothing emptyset
ℝ R Z N Q C reals Reals integers naturals ℤ ℕ ℚ ℂ
∨ or lor vee
∧ and land wedge
∀ forall
→ to rightarrow longrightarrow ->
⇒ implies Rightarrow Longrightarrow iff Leftrightarrow Longleftrightarrow therefore => ⇔ ∴
∞ infty infin infinity
e exponentialE@e
i imaginaryI@i imaginaryJ@i
° degree circ
⊤ top intercal
' prime ′ ’
| vert lvert rvert mid ∣
⦃ lbrace \{
⦄ rbrace \}
{
}
[ lbrack
] rbrack
( lparen
) rparen
⌊ lfloor
⌋ rfloor
⌈ lceil
⌉ rceil
,
;
.
&
: colon
≔ := coloneq coloneqq
% \%
F frac dfrac tfrac cfrac
C binom dbinom tbinom
√ sqrt
∫ int
∑ sum
∏ prod
L lim
l log lg lb
O overline bar
B begin
E end
N cr \\
H placeholder
T text mbox textrm textnormal
A vec hat tilde mathbf bm boldsymbol
M mathrm operatorname mathit mathsf textup rm
X boxed fbox cancel bcancel xcancel underline
D mathbb
S $ \! displaystyle textstyle scriptstyle limits nolimits mathstrut strut nonumber
~ \, \: \; \> quad qquad thinspace enspace enskip medspace thickspace
h hspace mspace
n not
f sin cos tan cot sec csc arcsin arccos arctan arccot arcsec arccsc sinh cosh tanh coth sech csch arsinh arcosh artanh
f ln exp gcd lcm min max arg det abs sign floor ceil conj Re@re Im@im sgn@sign cosec@csc tg@tan ctg@cot cotan@cot
f asin@arcsin acos@arccos atan@arctan arcsinh@arsinh arccosh@arcosh arctanh@artanh asinh@arsinh acosh@arcosh atanh@artanh
a αalpha βbeta γgamma δdelta epsilon εvarepsilon ζzeta ηeta θtheta vartheta ιiota κkappa λlambda μmu νnu ξxi πpi ρrho
a σsigma varsigma τtau υupsilon phi φvarphi χchi ψpsi ωomega ΓGamma ΔDelta ΘTheta ΛLambda ΞXi ΠPi ΣSigma Upsilon ΦPhi
a ΨPsi ΩOmega ell hbar ∂partial differentialD@d`;

/** What a command or character is, and the text that its token carries. */
export interface Entry {
  readonly kind: TokenKind;
  readonly text: string;
}

const TABLE = new Map<string, Entry>();
for (const row of ROWS.trim().split('\n')) {
  const [kind = '', ...names] = row.split(' ');
  for (const name of isLetter(kind) ? names : [kind, ...names]) addName(kind, name);
}

/** Is the first character a letter of the alphabet? */
function isLetter(text: string): boolean {
  return /^[a-zA-Z]/.test(text);
}

function addName(kind: TokenKind, entry: string): void {
  const [, char = '', name = '', meaning] = /^([^ -~]?)([^@]*)@?(.*)$/.exec(entry)!;
  // `ℝ`, `R` and `reals` are all the set R.
  const set = (name || char).normalize('NFKD').charAt(0).toUpperCase();
  const text = meaning || (kind === 'a' ? `\\${name}` : kind === 'ℝ' ? set : name);
  for (const key of [char, isLetter(name) ? `\\${name}` : name]) if (key) TABLE.set(key, { kind, text });
}

/** Looks up a command with its backslash, or a sign of one or two characters. */
export function findEntry(name: string): Entry | undefined {
  return TABLE.get(name);
}

/** Functions, roots, or, and; pi and longer Greek letters; infinity. All else needs its backslash. */
const WORD = /^(?:[fl√∨∧](?!lb$)|api$|a(?!hbar).{4}|∞infinity)/;

/** Looks up what is a word without its backslash. */
export function findWord(word: string): Entry | undefined {
  const entry = findEntry(`\\${word}`);
  return entry && WORD.test(entry.kind + word) ? entry : undefined;
}

/** The function that a command or plain word names, if any. */
export function functionOf(word: string): string | undefined {
  const entry = findEntry(`\\${word}`);
  return entry?.kind === 'f' ? entry.text : undefined;
}

/** Would these letters, printed side by side, be read as a word? */
export function hidesWord(letters: string): boolean {
  for (let from = 0; from < letters.length; from += 1) {
    for (let to = from + 2; to <= Math.min(letters.length, from + 8); to += 1) {
      const part = letters.slice(from, to);
      if (part === 'let' || findWord(part)) return true;
    }
  }
  return false;
}
