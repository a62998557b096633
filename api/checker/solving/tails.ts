import { createForms, type Forms } from '../compare/normal-forms.ts';
import { addForms, keyOfForm, type Form } from '../numbers/form.ts';
import {
  addIntervals,
  aroundDouble,
  divIntervals,
  expInterval,
  intervalSign,
  lnInterval,
  mulIntervals,
  negateInterval,
  pointInterval,
  wholeInterval,
  type Interval,
} from '../numbers/interval.ts';
import { add, one, rational, toNumber, zero, type Rational } from '../numbers/rational.ts';
import { charge } from '../numbers/work.ts';
import type { Graph, GraphNode } from '../values/graph.ts';
import { IntervalEvaluator } from './interval-values.ts';

/** coefficient * x^power * (ln x)^logs * e^(rate x); equal rates have equal forms. */
interface Term {
  readonly coefficient: Interval;
  readonly power: Rational;
  readonly logs: number;
  readonly rate: Interval;
  readonly rateForm: Form;
}

const mostTerms = 60;
const noRate: Pick<Term, 'rate' | 'rateForm'> = { rate: pointInterval(0), rateForm: new Map() };

const expansions = new WeakMap<Graph, Map<string, readonly Term[] | null>>();

/** Asked for again and again while the same function is looked at from other places. */
function termsOf(graph: Graph, letter: string): readonly Term[] | null {
  const known = expansions.get(graph) ?? new Map<string, readonly Term[] | null>();
  const found = known.get(letter);
  if (found !== undefined) return found;
  charge(2 * graph.nodes.length);
  const terms = new Expansion(graph, letter).terms();
  expansions.set(graph, known.set(letter, terms));
  return terms;
}

/** Whether a function has no zero from x on to one side, because one of its terms outgrows all others together. */
export function hasNoZeroBeyond(graph: Graph, letter: string, x: number, side: 1 | -1): boolean {
  if (Math.abs(x) < 4 || Math.sign(x) !== side) return false;
  const terms = termsOf(graph, letter);
  const seen: readonly (Term | null)[] = (side === 1 ? terms : terms?.map(mirrored)) ?? [null];
  return !seen.includes(null) && isDominated(seen as Term[], Math.abs(x));
}

/** The same for all positive numbers up to x. */
export function hasNoZeroDownToZero(graph: Graph, letter: string, x: number): boolean {
  if (!(x > 0 && x < 0.25)) return false;
  const terms = termsOf(graph, letter);
  if (!terms || terms.some((term) => term.rateForm.size > 0)) return false;
  const inverted = terms.map((term) => ({
    ...term,
    power: { num: -term.power.num, den: term.power.den },
    coefficient: term.logs % 2 === 0 ? term.coefficient : negateInterval(term.coefficient),
  }));
  return isDominated(inverted, 1 / (x * (1 + 1e-15)));
}

/** The function of -x; null where the term has no value there. */
function mirrored(term: Term): Term | null {
  if (term.power.den !== 1n || term.logs !== 0) return null;
  const isOdd = term.power.num % 2n !== 0n;
  return {
    ...term,
    coefficient: isOdd ? negateInterval(term.coefficient) : term.coefficient,
    rate: negateInterval(term.rate),
  };
}

function isDominated(terms: readonly Term[], x: number): boolean {
  for (const leader of terms) {
    if (intervalSign(leader.coefficient) === 0) continue;
    const shares = terms.filter((term) => term !== leader).map((term) => shareOf(term, leader, x));
    if (shares.every((share) => share !== null) && shares.reduce<number>((sum, s) => sum + (s ?? 1), 0) < 0.99)
      return true;
  }
  return false;
}

/** An upper bound for |term / leader| at x, where the ratio falls from there on; null where it does not. */
function shareOf(term: Term, leader: Term, x: number): number | null {
  const power = toNumber(term.power) - toNumber(leader.power);
  const logs = term.logs - leader.logs;
  const rate =
    keyOfForm(term.rateForm) === keyOfForm(leader.rateForm)
      ? pointInterval(0)
      : addIntervals(term.rate, negateInterval(leader.rate));
  if (rate.hi < 0) {
    if (x * -rate.hi < 1.001 * (Math.max(power, 0) + Math.max(logs, 0))) return null;
  } else if (rate.lo < 0 || rate.hi > 0) return null;
  else if (power < 0) {
    if (Math.log(x) * -power < 1.001 * logs) return null;
  } else if (power > 0 || logs >= 0) return null;
  const size = Math.max(Math.abs(term.coefficient.lo), Math.abs(term.coefficient.hi));
  const least = Math.min(Math.abs(leader.coefficient.lo), Math.abs(leader.coefficient.hi));
  if (size === 0) return 0;
  const log = lnInterval(aroundDouble(x)) as Interval;
  const parts = [
    lnInterval(pointInterval(size)) as Interval,
    negateInterval(lnInterval(pointInterval(least)) as Interval),
    mulIntervals(aroundDouble(power), log),
    mulIntervals(pointInterval(logs), lnInterval(log) as Interval),
    mulIntervals(rate, aroundDouble(x)),
  ];
  return expInterval(parts.reduce(addIntervals)).hi;
}

/** Writes the nodes of a graph as sums of terms, where they are such sums. */
class Expansion {
  private readonly graph: Graph;
  private readonly letter: string;
  private readonly forms: Forms;
  private readonly known = new Map<number, readonly Term[] | null>();
  private readonly moving = new Map<number, boolean>();

  constructor(graph: Graph, letter: string) {
    this.graph = graph;
    this.letter = letter;
    this.forms = createForms(graph.nodes, false);
  }

  terms(): readonly Term[] | null {
    return this.visit(this.graph.root);
  }

  private visit(index: number): readonly Term[] | null {
    const found = this.known.get(index);
    if (found !== undefined) return found;
    const node = this.graph.nodes[index];
    const result = node ? this.expand(node, index) : null;
    const kept = result && result.length <= mostTerms ? merge(result) : null;
    this.known.set(index, kept);
    return kept;
  }

  private expand(node: GraphNode, index: number): readonly Term[] | null {
    const constant = this.constant(index);
    if (constant) return [{ coefficient: constant, power: zero, logs: 0, ...noRate }];
    switch (node.op) {
      case 'letter':
        return [{ coefficient: pointInterval(1), power: one, logs: 0, ...noRate }];
      case 'add':
        return this.visitAll(node.args)?.flat() ?? null;
      case 'negate':
        return this.visit(node.args[0])?.map((t) => ({ ...t, coefficient: negateInterval(t.coefficient) })) ?? null;
      case 'mul':
        return this.visitAll(node.args)?.reduce(multiply) ?? null;
      case 'power': {
        const base = this.visit(node.args[0]);
        if (!base || node.exponent < 1 || node.exponent > 8) return null;
        return Array.from({ length: node.exponent - 1 }).reduce<readonly Term[]>((p) => multiply(p, base), base);
      }
      case 'root':
        return this.root(node.args[0], node.degree);
      case 'call':
        return node.args[0] === undefined ? null : this.call(node.name, node.args[0]);
      default:
        return null;
    }
  }

  private visitAll(args: readonly number[]): (readonly Term[])[] | null {
    const parts = args.map((arg) => this.visit(arg));
    return parts.includes(null) ? null : (parts as (readonly Term[])[]);
  }

  /** What a node without the letter is worth. */
  private constant(index: number): Interval | null {
    if (this.usesLetter(index) || !this.forms.formOf(index)) return null;
    return new IntervalEvaluator({ nodes: this.graph.nodes, root: index }).at(pointInterval(0));
  }

  private usesLetter(index: number): boolean {
    const known = this.moving.get(index);
    if (known !== undefined) return known;
    const node = this.graph.nodes[index];
    const found =
      node?.op === 'letter' ? node.name === this.letter : (node?.args ?? []).some((arg) => this.usesLetter(arg));
    this.moving.set(index, found);
    return found;
  }

  private root(arg: number, degree: number): readonly Term[] | null {
    const [only, ...others] = this.visit(arg) ?? [];
    if (!only || others.length > 0 || only.logs !== 0 || only.rateForm.size > 0 || intervalSign(only.coefficient) !== 1)
      return null;
    const size = only.coefficient;
    const coefficient = expInterval(divIntervals(lnInterval(size) as Interval, pointInterval(degree)));
    return [{ ...only, coefficient, power: rational(only.power.num, only.power.den * BigInt(degree)) }];
  }

  private call(name: string, arg: number): readonly Term[] | null {
    if (name === 'ln') {
      const node = this.graph.nodes[arg];
      return node?.op === 'letter' ? [{ coefficient: pointInterval(1), power: zero, logs: 1, ...noRate }] : null;
    }
    return name === 'exp' ? this.exponential(arg) : null;
  }

  private exponential(arg: number): readonly Term[] | null {
    const form = this.forms.formOf(arg);
    const linear = form && this.linearPart(form);
    if (!linear) return null;
    const evaluator = new IntervalEvaluator({ nodes: this.graph.nodes, root: arg });
    const offset = evaluator.at(pointInterval(0));
    const sum = evaluator.at(pointInterval(1));
    if (!offset || !sum) return null;
    const rate = addIntervals(sum, negateInterval(offset));
    return [{ coefficient: expInterval(offset), power: zero, logs: 0, rate, rateForm: linear }];
  }

  /** The terms of a form that hold the letter, where each holds it once and as itself. */
  private linearPart(form: Form): Form | null {
    const letterAtom = this.forms.atoms.findIndex((atom) => atom.kind === 'letter' && atom.name === this.letter);
    const linear = new Map([...form].filter(([, { powers }]) => powers.some(([atom]) => atom === letterAtom)));
    for (const { powers } of linear.values()) {
      if (powers.some(([atom, exponent]) => (atom === letterAtom ? exponent !== 1 : this.atomUsesLetter(atom))))
        return null;
    }
    for (const [key, { powers }] of form) {
      if (!linear.has(key) && powers.some(([atom]) => this.atomUsesLetter(atom))) return null;
    }
    return linear;
  }

  private atomUsesLetter(id: number): boolean {
    const atom = this.forms.atoms[id];
    if (atom?.kind === 'letter') return atom.name === this.letter;
    if (atom?.kind === 'other') return this.usesLetter(atom.node);
    if (atom?.kind === 'log') return typeof atom.of === 'number' && this.atomUsesLetter(atom.of);
    return atom !== undefined && 'form' in atom
      ? [...atom.form.values()].some(({ powers }) => powers.some(([other]) => this.atomUsesLetter(other)))
      : false;
  }
}

function multiply(a: readonly Term[], b: readonly Term[]): readonly Term[] {
  if (a.length * b.length > 4 * mostTerms) return Array.from({ length: mostTerms + 1 }, () => a[0] as Term);
  return a.flatMap((p) =>
    b.map((q): Term => {
      const rateForm = addForms(p.rateForm, q.rateForm);
      return {
        coefficient: rateForm ? mulIntervals(p.coefficient, q.coefficient) : wholeInterval,
        power: add(p.power, q.power),
        logs: p.logs + q.logs,
        rate: rateForm?.size === 0 ? pointInterval(0) : addIntervals(p.rate, q.rate),
        rateForm: rateForm ?? new Map(),
      };
    }),
  );
}

/** Like terms as one. */
function merge(terms: readonly Term[]): Term[] {
  const found = new Map<string, Term>();
  for (const term of terms) {
    const key = `${term.power.num}/${term.power.den} ${term.logs} ${keyOfForm(term.rateForm)}`;
    const known = found.get(key);
    found.set(key, known ? { ...term, coefficient: addIntervals(known.coefficient, term.coefficient) } : term);
  }
  return [...found.values()];
}
