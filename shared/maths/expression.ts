/** Offsets into the TeX text of one line: `start` included, `end` excluded. */
export interface Span {
  readonly start: number;
  readonly end: number;
}

interface Node {
  /**
   * Exactly the text that was read. What has no text of its own takes that of its neighbours: the sine in `\sin^2 x` has the
   * span of the power, the 1 in `\int dx` that of dx.
   */
  readonly span: Span;
  /** The span with the brackets that the author wrote around this node, where there are any. */
  readonly bracketed?: Span;
}

export type FunctionName =
  | 'sin'
  | 'cos'
  | 'tan'
  | 'cot'
  | 'sec'
  | 'csc'
  | 'arcsin'
  | 'arccos'
  | 'arctan'
  | 'arccot'
  | 'arcsec'
  | 'arccsc'
  | 'sinh'
  | 'cosh'
  | 'tanh'
  | 'coth'
  | 'sech'
  | 'csch'
  | 'arsinh'
  | 'arcosh'
  | 'artanh'
  | 'ln'
  | 'exp'
  | 'abs'
  | 'sign'
  | 'floor'
  | 'ceil'
  | 'gcd'
  | 'lcm'
  | 'min'
  | 'max'
  | 're'
  | 'im'
  | 'conj'
  | 'arg'
  | 'det'
  | 'transpose'
  /** `x^\circ`: the argument times pi / 180. */
  | 'degrees';

export type TermSign = 'plus' | 'minus' | 'plusminus' | 'minusplus';

/** What was written: never simplified, a span on every node. */
export type Expr =
  | NumberExpr
  | LetterExpr
  | ConstantExpr
  | SumExpr
  | ProductExpr
  | QuotientExpr
  | PowerExpr
  | RootExpr
  | CallExpr
  | LogExpr
  | ApplyExpr
  | FactorialExpr
  | BinomialExpr
  | SeriesExpr
  | DerivativeExpr
  | RateExpr
  | IntegralExpr
  | EvaluatedExpr
  | LimitExpr
  | MatrixExpr;

/** A non-negative number as written; the value is numerator / denominator in lowest terms. */
export interface NumberExpr extends Node {
  readonly kind: 'number';
  readonly numerator: bigint;
  readonly denominator: bigint;
  readonly written: 'integer' | 'decimal' | 'mixed' | 'percent' | 'repeating';
  /** Digits after the decimal point, 0 for other forms. */
  readonly decimals: number;
}
/** A letter with its subscript, in one canonical spelling: `x`, `x_1`, `\alpha`, `v_{max}`. */
export interface LetterExpr extends Node {
  readonly kind: 'letter';
  readonly name: string;
}
export interface ConstantExpr extends Node {
  readonly kind: 'constant';
  readonly name: 'pi' | 'e' | 'i' | 'infinity';
}
/** One or more signed terms; a lone `-a` is a sum of one term. */
export interface SumExpr extends Node {
  readonly kind: 'sum';
  readonly terms: readonly Term[];
}
export interface Term {
  readonly sign: TermSign;
  readonly expr: Expr;
  /** From the sign (where one is written) to the end of the term. */
  readonly span: Span;
}
export interface ProductExpr extends Node {
  readonly kind: 'product';
  readonly factors: readonly Expr[];
  /** How each factor but the first is joined to the one before it. */
  readonly joins: readonly ('implicit' | 'dot' | 'times')[];
}
export interface QuotientExpr extends Node {
  readonly kind: 'quotient';
  readonly numerator: Expr;
  readonly denominator: Expr;
  readonly written: 'fraction' | 'slash' | 'divide';
}
export interface PowerExpr extends Node {
  readonly kind: 'power';
  readonly base: Expr;
  readonly exponent: Expr;
}
/** `degree` null: a square root. */
export interface RootExpr extends Node {
  readonly kind: 'root';
  readonly degree: Expr | null;
  readonly radicand: Expr;
}
/** A named function; powers of functions are a `power` whose base is the call. */
export interface CallExpr extends Node {
  readonly kind: 'call';
  readonly name: FunctionName;
  readonly args: readonly Expr[];
}
/** `base` null: base 10, unless the reader was told otherwise. */
export interface LogExpr extends Node {
  readonly kind: 'log';
  readonly base: Expr | null;
  readonly argument: Expr;
}
/** A function of the derivation's own, such as f(x) or f''(x), read so only when f was introduced. */
export interface ApplyExpr extends Node {
  readonly kind: 'apply';
  readonly name: string;
  readonly primes: number;
  /** Empty for a bare f' or y'. */
  readonly args: readonly Expr[];
}
export interface FactorialExpr extends Node {
  readonly kind: 'factorial';
  readonly operand: Expr;
}
export interface BinomialExpr extends Node {
  readonly kind: 'binomial';
  readonly top: Expr;
  readonly bottom: Expr;
}
export interface SeriesExpr extends Node {
  readonly kind: 'series';
  readonly operation: 'sum' | 'product';
  readonly index: string;
  readonly from: Expr;
  readonly to: Expr;
  readonly body: Expr;
}
/** The operator d/dx (or a partial one) applied to an operand; order >= 1. */
export interface DerivativeExpr extends Node {
  readonly kind: 'derivative';
  readonly variable: string;
  readonly order: number;
  readonly partial: boolean;
  readonly operand: Expr;
}
/** dy/dx as a quantity of its own. */
export interface RateExpr extends Node {
  readonly kind: 'rate';
  readonly of: string;
  readonly by: string;
  readonly order: number;
  /** Written with the rounded d. */
  readonly partial?: boolean;
}
/** Both bounds null: an indefinite integral. */
export interface IntegralExpr extends Node {
  readonly kind: 'integral';
  readonly integrand: Expr;
  readonly variable: string;
  readonly from: Expr | null;
  readonly to: Expr | null;
}
/** [F(x)]_a^b; `variable` null when the operand has one letter or none is named. */
export interface EvaluatedExpr extends Node {
  readonly kind: 'evaluated';
  readonly operand: Expr;
  readonly variable: string | null;
  readonly from: Expr | null;
  readonly to: Expr;
}
export interface LimitExpr extends Node {
  readonly kind: 'limit';
  readonly variable: string;
  readonly to: Expr;
  readonly side: 'both' | 'left' | 'right';
  readonly operand: Expr;
}
/** A vector is a matrix of one row or one column. */
export interface MatrixExpr extends Node {
  readonly kind: 'matrix';
  readonly rows: readonly (readonly Expr[])[];
  /** How many columns stand before a bar, in a matrix that stands for equations. */
  readonly bar?: number;
}

export type RelationSign = '=' | '<' | '>' | '<=' | '>=' | '!=' | 'approx';

export type SetExpr =
  | { readonly kind: 'finite'; readonly items: readonly Expr[]; readonly span: Span }
  | {
      readonly kind: 'interval';
      /** null: unbounded on that side. */
      readonly from: Expr | null;
      readonly to: Expr | null;
      readonly fromClosed: boolean;
      readonly toClosed: boolean;
      readonly span: Span;
    }
  | { readonly kind: 'union' | 'intersection'; readonly parts: readonly SetExpr[]; readonly span: Span }
  | { readonly kind: 'without'; readonly from: SetExpr; readonly removed: SetExpr; readonly span: Span }
  | { readonly kind: 'empty' | 'reals' | 'integers' | 'naturals' | 'rationals' | 'complex'; readonly span: Span };

/** What one line says. */
export type Line =
  | { readonly kind: 'expression'; readonly expr: Expr; readonly span: Span }
  | {
      readonly kind: 'relation';
      readonly left: Expr;
      readonly sign: RelationSign;
      readonly right: Expr;
      readonly span: Span;
    }
  /** Three or more members: members[k] signs[k] members[k+1]. */
  | {
      readonly kind: 'chain';
      readonly members: readonly Expr[];
      readonly signs: readonly RelationSign[];
      readonly span: Span;
    }
  /** A line that begins with a relation sign: signs[k] stands before members[k]. */
  | {
      readonly kind: 'continuation';
      readonly members: readonly Expr[];
      readonly signs: readonly RelationSign[];
      readonly span: Span;
    }
  | { readonly kind: 'any' | 'all'; readonly parts: readonly Line[]; readonly span: Span }
  /** `letter` null where the line is a bare set. */
  | {
      readonly kind: 'membership';
      readonly letter: Expr | null;
      readonly set: SetExpr;
      readonly negated: boolean;
      readonly span: Span;
    }
  /** "no solution" and "all real x". */
  | { readonly kind: 'none'; readonly span: Span }
  | { readonly kind: 'always'; readonly letter: string | null; readonly span: Span }
  /** `let u = ...` (params empty) or `f(x) = ...`. */
  | {
      readonly kind: 'definition';
      readonly name: string;
      readonly params: readonly string[];
      readonly value: Expr;
      readonly span: Span;
    };

/** What the eye might not expect: shown as "reads as" while typing. */
export type ReadingFlag =
  | 'mixed-number'
  | 'slash-product'
  | 'function-argument'
  | 'power-digits'
  | 'inverse-function'
  | 'letter-product'
  | 'continues'
  | 'comma-or'
  | 'comma-and'
  | 'numbered-values'
  | 'percent'
  | 'imaginary-unit'
  | 'log-base'
  | 'unknown-function';

export type ReadErrorCode =
  | 'empty'
  | 'too-long'
  | 'too-deep'
  | 'too-many-nodes'
  | 'unknown-command'
  | 'unknown-character'
  | 'missing-operand'
  | 'missing-bracket'
  | 'extra-bracket'
  | 'missing-argument'
  | 'bad-relation'
  | 'bad-set'
  | 'bad-number'
  | 'bad-integral'
  | 'bad-limit'
  | 'bad-derivative'
  | 'bad-series'
  | 'ragged-matrix'
  | 'mixed-joins'
  | 'piecewise'
  | 'text';

/** What the reader expected: the bracket that is missing or a word for it, with a detail after a blank. */
export type Complaint = string;

/** Why a line was refused, as the reader says it; `explainRefusal` makes a `ReadError` of it. */
export interface Refusal {
  readonly complaint: Complaint;
  readonly span: Span;
  /** The line, as far as it is read. */
  readonly tex: string;
}

/** What could not be read: where, what stands there and what was expected. Worded by the client. */
export interface ReadError {
  readonly code: ReadErrorCode;
  readonly span: Span;
  readonly found: string;
  readonly expected: readonly string[];
}

export interface ReadSettings {
  readonly numbers: 'real' | 'complex';
  readonly decimal: 'point' | 'comma';
  /** Letters that earlier lines introduced as functions. */
  readonly functions: readonly string[];
}

export type Reading =
  | {
      readonly ok: true;
      readonly line: Line;
      readonly flags: readonly ReadingFlag[];
      /** The other ways to read the line, where there are any: the author is asked. Each is printed without ambiguity. */
      readonly alternatives: readonly Line[];
    }
  | { readonly ok: false; readonly refusal: Refusal };
