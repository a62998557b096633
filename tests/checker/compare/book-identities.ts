/**
 * Identities and values of open textbooks and handbooks, source beside each. OpenStax books are under a Creative Commons
 * licence (CC BY 4.0): formulas and numbers only, with attribution.
 */
export interface KnownIdentity {
  readonly left: string;
  readonly right: string;
  readonly source: string;
}

export const bookIdentities: readonly KnownIdentity[] = [
  {
    left: String.raw`t^{5}\cdot t^{3}`,
    right: String.raw`t^{8}`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51241 (Exponents, Example 1)',
  },
  {
    left: String.raw`\frac{z^{2}\cdot z}{z^{4}}`,
    right: String.raw`\frac{1}{z}`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51241 (Example 5)',
  },
  {
    left: String.raw`(ab^{2})^{3}`,
    right: String.raw`a^{3}b^{6}`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51241 (Example 7)',
  },
  {
    left: String.raw`(-2w^{3})^{3}`,
    right: String.raw`-8w^{9}`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51241 (Example 7)',
  },
  {
    left: String.raw`\left(\frac{u^{-1}v}{v^{-1}}\right)^{2}`,
    right: String.raw`\frac{v^{4}}{u^{2}}`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51241 (Example 9)',
  },
  {
    left: String.raw`\frac{(3w^{2})^{5}}{(6w^{-2})^{2}}`,
    right: String.raw`\frac{27w^{14}}{4}`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51241 (Example 9)',
  },
  {
    left: String.raw`\sqrt{25+144}`,
    right: String.raw`13`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51242 (Radicals, Example 1)',
  },
  {
    left: String.raw`\sqrt{162a^{5}b^{4}}`,
    right: String.raw`9a^{2}b^{2}\sqrt{2a}`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51242 (Example 2)',
  },
  {
    left: String.raw`\frac{\sqrt{234x^{11}y}}{\sqrt{26x^{7}y}}`,
    right: String.raw`3x^{2}`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51242 (Example 5)',
  },
  {
    left: String.raw`5\sqrt{12}+2\sqrt{3}`,
    right: String.raw`12\sqrt{3}`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51242 (Example 6)',
  },
  {
    left: String.raw`343^{2/3}`,
    right: String.raw`49`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51242 (Example 11)',
  },
  {
    left: String.raw`(12x^{2}+9x-21)+(4x^{3}+8x^{2}-5x+20)`,
    right: String.raw`4x^{3}+20x^{2}+4x-1`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51246 (Polynomials, Example 2)',
  },
  {
    left: String.raw`(7x^{4}-x^{2}+6x+1)-(5x^{3}-2x^{2}+3x+2)`,
    right: String.raw`7x^{4}-5x^{3}+x^{2}+3x-1`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51246 (Example 3)',
  },
  {
    left: String.raw`(2x+1)(3x^{2}-x+4)`,
    right: String.raw`6x^{3}+x^{2}+7x+4`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51246 (Example 4)',
  },
  {
    left: String.raw`(2x-18)(3x+3)`,
    right: String.raw`6x^{2}-48x-54`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51246 (Example 5)',
  },
  {
    left: String.raw`(3x-8)^{2}`,
    right: String.raw`9x^{2}-48x+64`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51246 (Example 6)',
  },
  {
    left: String.raw`(x+4)(3x-2y+5)`,
    right: String.raw`3x^{2}-2xy+17x-8y+20`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51246 (Example 8)',
  },
  {
    left: String.raw`6x^{3}y^{3}+45x^{2}y^{2}+21xy`,
    right: String.raw`3xy(2x^{2}y^{2}+15xy+7)`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51247 (Factoring, Example 1)',
  },
  {
    left: String.raw`x^{2}+2x-15`,
    right: String.raw`(x-3)(x+5)`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51247 (Example 2)',
  },
  {
    left: String.raw`5x^{2}+7x-6`,
    right: String.raw`(5x-3)(x+2)`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51247 (Example 3)',
  },
  {
    left: String.raw`9x^{2}-25`,
    right: String.raw`(3x+5)(3x-5)`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51247 (Example 5)',
  },
  {
    left: String.raw`x^{3}+512`,
    right: String.raw`(x+8)(x^{2}-8x+64)`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51247 (Example 6)',
  },
  {
    left: String.raw`3x(x+2)^{-1/3}+4(x+2)^{2/3}`,
    right: String.raw`(x+2)^{-1/3}(7x+8)`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51247 (Example 8)',
  },
  {
    left: String.raw`8x^{3}+27y^{3}`,
    right: String.raw`(2x+3y)(4x^{2}-6xy+9y^{2})`,
    source:
      'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51256 (Quadratic Equations, Example 1d)',
  },
  {
    left: String.raw`16x^{2}+24xy-4x-6y`,
    right: String.raw`2(2x+3y)(4x-1)`,
    source:
      'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51256 (Quadratic Equations, Example 1e)',
  },
  {
    left: String.raw`\frac{x^{2}-9}{x^{2}+4x+3}`,
    right: String.raw`\frac{x-3}{x+1}`,
    source:
      'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51248 (Rational Expressions, Example 1)',
  },
  {
    left: String.raw`\frac{x^{2}+4x-5}{3x+18}\cdot\frac{2x-1}{x+5}`,
    right: String.raw`\frac{(x-1)(2x-1)}{3(x+6)}`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51248 (Example 2)',
  },
  {
    left: String.raw`\frac{2x^{2}+x-6}{x^{2}-1}\div\frac{x^{2}-4}{x^{2}+2x+1}`,
    right: String.raw`\frac{(2x-3)(x+1)}{(x-1)(x-2)}`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51248 (Example 3)',
  },
  {
    left: String.raw`\frac{5}{x}+\frac{6}{y}`,
    right: String.raw`\frac{6x+5y}{xy}`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51248 (Example 4)',
  },
  {
    left: String.raw`\frac{6}{x^{2}+4x+4}-\frac{2}{x^{2}-4}`,
    right: String.raw`\frac{4(x-4)}{(x+2)^{2}(x-2)}`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51248 (Example 5)',
  },
  {
    left: String.raw`\frac{y+\frac1x}{\frac xy}`,
    right: String.raw`\frac{y(xy+1)}{x^{2}}`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51248 (Example 6)',
  },
  {
    left: String.raw`\log_2\sqrt[4]{\frac{x^{3}}{3y^{2}z}}`,
    right: String.raw`\tfrac14(3\log_2 x-\log_2 3-2\log_2 y-\log_2 z)`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m49365 (Example 3)',
  },
  {
    left: String.raw`\log_4 3+\log_4 x-\log_4 y`,
    right: String.raw`\log_4\frac{3x}{y}`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m49365 (Example 4)',
  },
  {
    left: String.raw`\log_6\frac{64x^{3}(4x+1)}{2x-1}`,
    right: String.raw`6\log_6 2+3\log_6 x+\log_6(4x+1)-\log_6(2x-1)`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m49365 (Example 12)',
  },
  {
    left: String.raw`\log_3 5+\log_3 8-\log_3 2`,
    right: String.raw`\log_3 20`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m49365 (Example 13)',
  },
  {
    left: String.raw`\log_2(x^{2})+\tfrac12\log_2(x-1)-3\log_2\big((x+3)^{2}\big)`,
    right: String.raw`\log_2\frac{x^{2}\sqrt{x-1}}{(x+3)^{6}}`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m49365 (Example 14)',
  },
  {
    left: String.raw`\log 3-\log 4+\log 5-\log 6`,
    right: String.raw`\log\tfrac58`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m49365 (note 18, Try It)',
  },
  {
    left: String.raw`1+\cot^{2}\theta`,
    right: String.raw`\csc^{2}\theta`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51288 (Pythagorean identities)',
  },
  {
    left: String.raw`(1+\sin x)(1+\sin(-x))`,
    right: String.raw`\cos^{2}x`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51288 (Example 3)',
  },
  {
    left: String.raw`\frac{\sec^{2}\theta-1}{\sec^{2}\theta}`,
    right: String.raw`\sin^{2}\theta`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51288 (Example 4)',
  },
  {
    left: String.raw`\frac{\sin^{2}(-\theta)-\cos^{2}(-\theta)}{\sin(-\theta)-\cos(-\theta)}`,
    right: String.raw`\cos\theta-\sin\theta`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51288 (Example 6)',
  },
  {
    left: String.raw`\cos(\alpha+\beta)`,
    right: String.raw`\cos\alpha\cos\beta-\sin\alpha\sin\beta`,
    source:
      'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51289 (Sum and Difference Identities, formula note 1)',
  },
  {
    left: String.raw`\sin(\alpha-\beta)`,
    right: String.raw`\sin\alpha\cos\beta-\cos\alpha\sin\beta`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51289 (note 5)',
  },
  {
    left: String.raw`\tan(\alpha+\beta)`,
    right: String.raw`\frac{\tan\alpha+\tan\beta}{1-\tan\alpha\tan\beta}`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51289 (note 7)',
  },
  {
    left: String.raw`\cos 105^{\circ}`,
    right: String.raw`\frac{\sqrt2-\sqrt6}{4}`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51289 (note 4, Try It)',
  },
  {
    left: String.raw`\tan 2\theta`,
    right: String.raw`\frac{2}{\cot\theta-\tan\theta}`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51290 (Double-Angle, Example 4)',
  },
  {
    left: String.raw`1+\sin 2\theta`,
    right: String.raw`(\sin\theta+\cos\theta)^{2}`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51290 (Example 3)',
  },
  {
    left: String.raw`\cos^{4}x`,
    right: String.raw`\tfrac38+\tfrac12\cos 2x+\tfrac18\cos 4x`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51290 (Example 5)',
  },
  {
    left: String.raw`\sin^{3}2x`,
    right: String.raw`\tfrac12\sin 2x\,(1-\cos 4x)`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51290 (Example 6)',
  },
  {
    left: String.raw`\cos^{4}\theta-\sin^{4}\theta`,
    right: String.raw`\cos 2\theta`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51290 (note 4, Try It)',
  },
  {
    left: String.raw`\sin 15^{\circ}`,
    right: String.raw`\frac{\sqrt{2-\sqrt3}}{2}`,
    source: 'OpenStax Algebra and Trigonometry 2e / College Algebra 2e, module m51290 (Example 7)',
  },
  {
    left: String.raw`\cos 3\theta`,
    right: String.raw`4\cos^{3}\theta-3\cos\theta`,
    source: 'NIST DLMF §4.21(iii); Abramowitz & Stegun 4.3.28 (from memory)',
  },
  {
    left: String.raw`\sin^{2}u-\sin^{2}v`,
    right: String.raw`\sin(u+v)\sin(u-v)`,
    source: 'NIST DLMF §4.21(ii) (from memory)',
  },
  { left: String.raw`\sinh 2z`, right: String.raw`2\sinh z\cosh z`, source: 'NIST DLMF §4.35(iii) (from memory)' },
  {
    left: String.raw`\operatorname{arsinh}x`,
    right: String.raw`\ln\!\left(x+\sqrt{x^{2}+1}\right)`,
    source: 'NIST DLMF §4.37(iv) (from memory)',
  },
  {
    left: String.raw`\cos(\arcsin x)`,
    right: String.raw`\sqrt{1-x^{2}}`,
    source: 'OpenStax Calculus (bundle), module m53584 (Derivatives of Inverse Functions, Example 4)',
  },
  {
    left: String.raw`(a+b)^{4}`,
    right: String.raw`a^{4}+4a^{3}b+6a^{2}b^{2}+4ab^{3}+b^{4}`,
    source: 'NIST DLMF §1.2(i), binomial theorem; Abramowitz & Stegun 3.1.1 (from memory)',
  },
  {
    left: String.raw`a^{5}-b^{5}`,
    right: String.raw`(a-b)(a^{4}+a^{3}b+a^{2}b^{2}+ab^{3}+b^{4})`,
    source: 'common handbook identity (from memory)',
  },
  {
    left: String.raw`(a^{2}+b^{2})(c^{2}+d^{2})`,
    right: String.raw`(ac-bd)^{2}+(ad+bc)^{2}`,
    source: 'Brahmagupta-Fibonacci identity, common handbooks (from memory)',
  },
  {
    left: String.raw`a^{4}+4b^{4}`,
    right: String.raw`(a^{2}+2b^{2}+2ab)(a^{2}+2b^{2}-2ab)`,
    source: 'Sophie Germain identity, common handbooks (from memory)',
  },
];
