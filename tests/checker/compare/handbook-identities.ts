/** Identities of handbooks, all from memory; each is true wherever both sides have a value. */
export interface HandbookIdentity {
  readonly left: string;
  readonly right: string;
  readonly source: string;
  /** Letters that stand for whole numbers. */
  readonly whole?: readonly string[];
  readonly assume?: readonly string[];
}

const identity = (
  left: string,
  right: string,
  source: string,
  more: Partial<HandbookIdentity> = {},
): HandbookIdentity => ({
  left,
  right,
  source: `${source} (from memory)`,
  ...more,
});

export const handbookIdentities: readonly HandbookIdentity[] = [
  identity(String.raw`\sin(a+b)`, String.raw`\sin a\cos b+\cos a\sin b`, 'NIST DLMF 4.21.2'),
  identity(String.raw`\cos(a+b)`, String.raw`\cos a\cos b-\sin a\sin b`, 'NIST DLMF 4.21.3'),
  identity(String.raw`\tan(a+b)`, String.raw`\frac{\tan a+\tan b}{1-\tan a\tan b}`, 'NIST DLMF 4.21.4'),
  identity(String.raw`\sin a+\sin b`, String.raw`2\sin\frac{a+b}{2}\cos\frac{a-b}{2}`, 'NIST DLMF 4.21.7'),
  identity(String.raw`\cos a-\cos b`, String.raw`-2\sin\frac{a+b}{2}\sin\frac{a-b}{2}`, 'NIST DLMF 4.21.10'),
  identity(String.raw`\sin x\sin y`, String.raw`\frac12(\cos(x-y)-\cos(x+y))`, 'NIST DLMF 4.21.15'),
  identity(String.raw`\sin^2 x`, String.raw`\frac{1-\cos 2x}{2}`, 'NIST DLMF 4.21.21'),
  identity(String.raw`\tan\frac{x}{2}`, String.raw`\frac{1-\cos x}{\sin x}`, 'NIST DLMF 4.21.23'),
  identity(String.raw`\sin 3x`, String.raw`3\sin x-4\sin^3 x`, 'Abramowitz & Stegun 4.3.27'),
  identity(String.raw`\cos 4x`, String.raw`8\cos^4 x-8\cos^2 x+1`, 'Abramowitz & Stegun 4.3.30'),
  identity(String.raw`\sin^3 x`, String.raw`\frac{3\sin x-\sin 3x}{4}`, 'Abramowitz & Stegun 4.3'),
  identity(String.raw`1+\tan^2 x`, String.raw`\sec^2 x`, 'NIST DLMF 4.21.13'),
  identity(
    String.raw`\sin x`,
    String.raw`\frac{2\tan\frac{x}{2}}{1+\tan^2\frac{x}{2}}`,
    'half-angle tangent, handbooks',
  ),
  identity(String.raw`\sin(\arccos x)`, String.raw`\sqrt{1-x^2}`, 'NIST DLMF 4.24'),
  identity(String.raw`\tan(\arcsin x)`, String.raw`\frac{x}{\sqrt{1-x^2}}`, 'NIST DLMF 4.24'),
  identity(String.raw`\cos(\arctan x)`, String.raw`\frac{1}{\sqrt{1+x^2}}`, 'NIST DLMF 4.24'),
  identity(String.raw`\arcsin x+\arccos x`, String.raw`\frac{\pi}{2}`, 'NIST DLMF 4.23.19'),
  identity(String.raw`\arcsin(-x)`, String.raw`-\arcsin x`, 'NIST DLMF 4.23.10'),
  identity(String.raw`\arccos(-x)`, String.raw`\pi-\arccos x`, 'NIST DLMF 4.23.11'),
  identity(String.raw`\arctan x+\arctan\frac{1}{x}`, String.raw`\frac{\pi}{2}`, 'NIST DLMF 4.24', { assume: ['x>0'] }),
  identity(String.raw`\cosh^2 x-\sinh^2 x`, '1', 'NIST DLMF 4.35.11'),
  identity(String.raw`\sinh(x+y)`, String.raw`\sinh x\cosh y+\cosh x\sinh y`, 'NIST DLMF 4.35.1'),
  identity(String.raw`\cosh 2x`, String.raw`2\sinh^2 x+1`, 'NIST DLMF 4.35.27'),
  identity(String.raw`\tanh x`, String.raw`\frac{e^{2x}-1}{e^{2x}+1}`, 'NIST DLMF 4.28.4'),
  identity(String.raw`\operatorname{arcosh}x`, String.raw`\ln\left(x+\sqrt{x^2-1}\right)`, 'NIST DLMF 4.37.19', {
    assume: ['x>1'],
  }),
  identity(String.raw`\operatorname{artanh}x`, String.raw`\frac12\ln\frac{1+x}{1-x}`, 'NIST DLMF 4.37.24'),
  identity(String.raw`\ln(xy)`, String.raw`\ln x+\ln y`, 'NIST DLMF 4.8.2', { assume: ['x>0', 'y>0'] }),
  identity(String.raw`\ln\frac{x}{y}`, String.raw`\ln x-\ln y`, 'NIST DLMF 4.8.4', { assume: ['x>0', 'y>0'] }),
  identity(String.raw`\log_3 x`, String.raw`\frac{\ln x}{\ln 3}`, 'NIST DLMF 4.2.34'),
  identity(String.raw`e^{x}e^{y}`, String.raw`e^{x+y}`, 'NIST DLMF 4.8.13'),
  identity(String.raw`(e^{x})^{3}`, String.raw`e^{3x}`, 'NIST DLMF 4.8'),
  identity(String.raw`x^{a}x^{b}`, String.raw`x^{a+b}`, 'Abramowitz & Stegun 4.2', { assume: ['x>0'] }),
  identity(String.raw`(xy)^{a}`, String.raw`x^{a}y^{a}`, 'Abramowitz & Stegun 4.2', { assume: ['x>0', 'y>0'] }),
  identity(String.raw`\sqrt{x}\sqrt{y}`, String.raw`\sqrt{xy}`, 'handbooks', { assume: ['x>0', 'y>0'] }),
  identity(String.raw`\sqrt[3]{x}\sqrt[3]{y}`, String.raw`\sqrt[3]{xy}`, 'handbooks'),
  identity(String.raw`\frac{1}{\sqrt{x}+\sqrt{y}}`, String.raw`\frac{\sqrt{x}-\sqrt{y}}{x-y}`, 'handbooks'),
  identity(String.raw`|xy|`, String.raw`|x||y|`, 'NIST DLMF 1.9.8'),
  identity(String.raw`\sqrt{x^2}`, '|x|', 'handbooks'),
  identity(String.raw`\max(x,y)`, String.raw`\frac{x+y+|x-y|}{2}`, 'handbooks'),
  identity(String.raw`\lceil x\rceil`, String.raw`-\lfloor-x\rfloor`, 'handbooks'),
  identity(String.raw`\binom{n}{k}`, String.raw`\frac{n!}{k!(n-k)!}`, 'NIST DLMF 1.2.1', { whole: ['n', 'k'] }),
  identity(String.raw`\binom{n}{k}+\binom{n}{k+1}`, String.raw`\binom{n+1}{k+1}`, 'NIST DLMF 1.2.7', {
    whole: ['n', 'k'],
    assume: [String.raw`k\ge0`, String.raw`n\ge0`],
  }),
  identity(String.raw`\binom{n}{3}`, String.raw`\frac{n(n-1)(n-2)}{6}`, 'NIST DLMF 1.2.6', { whole: ['n'] }),
  identity(String.raw`(n+1)!`, String.raw`(n+1)\cdot n!`, 'NIST DLMF 5.5.1', { whole: ['n'] }),
  identity(String.raw`\frac{(n+2)!}{n!}`, String.raw`n^2+3n+2`, 'NIST DLMF 5.5.1', { whole: ['n'] }),
  identity(String.raw`a^3+b^3`, String.raw`(a+b)(a^2-ab+b^2)`, 'Abramowitz & Stegun 3.1'),
  identity(String.raw`\frac{1}{(x+1)(x+2)}`, String.raw`\frac{1}{x+1}-\frac{1}{x+2}`, 'NIST DLMF 1.2 (iii)'),
  identity(String.raw`\frac{x^{5}-1}{x-1}`, String.raw`1+x+x^2+x^3+x^4`, 'NIST DLMF 1.2.11'),
  identity(String.raw`x^{n+1}-x^{n}`, String.raw`x^{n}(x-1)`, 'Abramowitz & Stegun 3.1', { whole: ['n'] }),
  identity(String.raw`2^{n}+2^{n}`, String.raw`2^{n+1}`, 'Abramowitz & Stegun 4.2', { whole: ['n'] }),
];
