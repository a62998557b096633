import {
  dividePolynomials,
  leading,
  primitivePart,
  squareFreePart,
  trim,
  type Polynomial,
} from '../solving/polynomial.ts';
import { isolateRealRoots } from '../solving/real-roots.ts';

const mostDegree = 9;

/** Whether a polynomial of positive degree has no factors of lower degree over the rationals. */
export function isIrreducible(p: Polynomial): boolean {
  if (p.length <= 2) return true;
  const part = squareFreePart(p);
  if (part.length < p.length) return false;
  if (isolateRealRoots(part).some((root) => root.low === root.high)) return false;
  if (p.length <= 4) return true;
  return p.length - 1 > mostDegree || !hasFactor(primitivePart(p));
}

interface Complex {
  readonly re: number;
  readonly im: number;
}

function times(a: Complex, b: Complex): Complex {
  return { re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re };
}

/**
 * A factor is the product over some of the roots: each choice of at most half of them is rounded to whole coefficients
 * and tried by exact division.
 */
function hasFactor(p: Polynomial): boolean {
  const roots = complexRoots(p.map(Number));
  const n = roots.length;
  for (let choice = 1; choice < 2 ** n; choice += 1) {
    const chosen = roots.filter((_, k) => (choice >> k) % 2 === 1);
    if (chosen.length < 2 || chosen.length > n / 2) continue;
    const candidate = roundedProduct(chosen, Number(leading(p)));
    if (candidate && candidate.length > 1 && dividePolynomials(p, candidate)) return true;
  }
  return false;
}

function roundedProduct(roots: readonly Complex[], lead: number): Polynomial | null {
  let product: Complex[] = [{ re: lead, im: 0 }];
  for (const root of roots) {
    const next = Array.from({ length: product.length + 1 }, (): Complex => ({ re: 0, im: 0 }));
    product.forEach((c, k) => {
      const lower = times(c, root);
      next[k] = { re: (next[k] as Complex).re - lower.re, im: (next[k] as Complex).im - lower.im };
      next[k + 1] = { re: (next[k + 1] as Complex).re + c.re, im: (next[k + 1] as Complex).im + c.im };
    });
    product = next;
  }
  const scale = Math.max(1, ...product.map((c) => Math.abs(c.re)));
  const isWhole = product.every(
    (c) => Math.abs(c.im) < 1e-4 * scale && Math.abs(c.re - Math.round(c.re)) < 1e-4 * scale,
  );
  return isWhole ? primitivePart(trim(product.map((c) => BigInt(Math.round(c.re))))) : null;
}

/** All roots at once (Durand and Kerner); for guesses that are then tried exactly. */
function complexRoots(coefficients: readonly number[]): Complex[] {
  const n = coefficients.length - 1;
  const lead = coefficients[n] as number;
  const size = 1 + Math.max(...coefficients.map((c) => Math.abs(c / lead)));
  let roots = Array.from({ length: n }, (_, k): Complex => {
    const angle = (2 * Math.PI * k) / n + 0.4;
    return { re: Math.min(size, 2) * Math.cos(angle), im: Math.min(size, 2) * Math.sin(angle) };
  });
  for (let round = 0; round < 300; round += 1) {
    roots = roots.map((root, k) => {
      let value: Complex = { re: 0, im: 0 };
      for (let j = n; j >= 0; j -= 1) {
        const raised = times(value, root);
        value = { re: raised.re + (coefficients[j] as number) / lead, im: raised.im };
      }
      let below: Complex = { re: 1, im: 0 };
      roots.forEach((other, j) => {
        if (j !== k) below = times(below, { re: root.re - other.re, im: root.im - other.im });
      });
      const norm = below.re ** 2 + below.im ** 2 || 1e-300;
      const step = times(value, { re: below.re / norm, im: -below.im / norm });
      return { re: root.re - step.re, im: root.im - step.im };
    });
  }
  return roots;
}
