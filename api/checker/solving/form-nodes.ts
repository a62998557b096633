import type { Forms } from '../compare/normal-forms.ts';
import type { Form } from '../numbers/form.ts';
import { rational } from '../numbers/rational.ts';
import type { GraphBuilder } from '../values/graph.ts';

/** Writes forms of the builder's own nodes as nodes again; null for a form with the imaginary unit. */
export function createFormNodes(builder: GraphBuilder, forms: Forms): (form: Form) => number | null {
  const ofForm = (form: Form): number | null => {
    const terms: number[] = [];
    for (const { coefficient, powers } of form.values()) {
      const factors: number[] = [];
      for (const [id, exponent] of powers) {
        const base = ofAtom(id);
        if (base === null) return null;
        factors.push(builder.power(base, exponent));
      }
      const isNegative = coefficient.num === -1n && coefficient.den === 1n;
      if (factors.length > 0 && isNegative) terms.push(builder.negate(builder.mul(factors)));
      else terms.push(builder.mul([builder.number(coefficient), ...factors]));
    }
    return builder.add(terms);
  };
  const call = (name: 'ln' | 'arcsin' | 'arctan', arg: number | null): number | null =>
    arg === null ? null : builder.push({ op: 'call', name, args: [arg] });
  const ofAtom = (id: number): number | null => {
    const atom = forms.atoms[id];
    switch (atom?.kind) {
      case 'pi':
      case 'e':
        return builder.push({ op: 'constant', args: [], name: atom.kind });
      case 'letter':
        return builder.push({ op: 'letter', args: [], name: atom.name });
      case 'factor':
        return ofForm(atom.form);
      case 'log':
        return call('ln', typeof atom.of === 'bigint' ? builder.number(rational(atom.of)) : ofAtom(atom.of));
      case 'arcsine':
        return call('arcsin', ofForm(atom.form));
      case 'arctangent':
        return call('arctan', ofForm(atom.form));
      case 'other':
        return atom.node;
      default:
        return null;
    }
  };
  return ofForm;
}
