import { escapeHtml } from './letter-layout.ts';

const STYLE = `
  :root { color-scheme: light dark; --paper: oklch(0.985 0.006 95); --ink: oklch(0.25 0.02 245); --edge: oklch(0.47 0.09 232); --on-edge: oklch(0.985 0.006 95); }
  @media (prefers-color-scheme: dark) { :root { --paper: oklch(0.22 0.02 245); --ink: oklch(0.93 0.008 95); --edge: oklch(0.78 0.085 228); --on-edge: oklch(0.2 0.02 245); } }
  body { margin: 0; background: var(--paper); color: var(--ink); font: 17px/1.65 Literata, Georgia, serif; }
  main { max-width: 32em; margin: 72px auto; padding: 0 24px; border-left: 2px solid var(--edge); }
  h1 { font-size: 28px; line-height: 1.2; font-weight: 440; margin: 0 0 16px; }
  button { font: inherit; color: var(--on-edge); background: var(--edge); border: 0; border-radius: 2px; padding: 10px 18px; cursor: pointer; }
  a { color: var(--edge); }
`;

/** A page of its own, because it must work for somebody who is not signed in and in any browser. */
export function toUnsubscribePage({ words, done }: { words: string; done: boolean }): string {
  const kind = escapeHtml(words);
  const body = done
    ? `<h1>No more of these letters</h1><p>“${kind}” will not be mailed to you any more. You can change this in <a href="/account">your account</a>.</p>`
    : `<h1>Stop these letters?</h1><p>You would no longer be mailed “${kind}”. Everything else stays as it is.</p><form method="post"><button>Stop these letters</button></form>`;
  return `<!doctype html>
<html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width"><meta name="robots" content="noindex"><title>Letters from Slipstone</title><style>${STYLE}</style></head>
<body><main>${body}</main></body></html>
`;
}
