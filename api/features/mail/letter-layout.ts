import type { LetterContent } from './letters.ts';

export interface LetterLinks {
  readonly baseUrl: string;
  /** null: the kind cannot be switched off. */
  readonly unsubscribeUrl: string | null;
}

/** The letter as plain text, with its links written out. */
export function toText(content: LetterContent, { baseUrl, unsubscribeUrl }: LetterLinks): string {
  const blocks = [greet(content.name), ...content.paragraphs];
  if (content.action) blocks.push(`${content.action.label}:\n${baseUrl}${content.action.path}`);
  if (content.afterwards) blocks.push(content.afterwards);
  blocks.push(`-- \nSlipstone, ${baseUrl}`);
  if (unsubscribeUrl) blocks.push(`No more letters of this kind:\n${unsubscribeUrl}`);
  return `${blocks.join('\n\n')}\n`;
}

// The product's paper, ink, rule and edge as sRGB, because mail programs do not know OKLCH.
const PAPER = '#fbfaf6';
const INK = '#1a232b';
const MUTED = '#606a74';
const RULE = '#d2d8de';
const EDGE = '#116384';
const TEXT_FONT = "Literata, Georgia, 'Times New Roman', serif";

/** The letter as HTML: one column along the edge, no tables, no pictures, nothing fetched. */
export function toHtml(content: LetterContent, { baseUrl, unsubscribeUrl }: LetterLinks): string {
  const paragraph = (text: string) => `<p style="margin:0 0 16px">${escapeHtml(text)}</p>`;
  const action = content.action
    ? `<p style="margin:24px 0"><a href="${escapeHtml(baseUrl + content.action.path)}" style="color:${PAPER};background:${EDGE};padding:10px 18px;text-decoration:none;border-radius:2px;display:inline-block">${escapeHtml(content.action.label)}</a></p>`
    : '';
  const afterwards = content.afterwards
    ? `<p style="margin:0 0 16px;color:${MUTED}">${escapeHtml(content.afterwards)}</p>`
    : '';
  const unsubscribe = unsubscribeUrl
    ? ` · <a href="${escapeHtml(unsubscribeUrl)}" style="color:${MUTED}">No more letters of this kind</a>`
    : '';
  return `<!doctype html>
<html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width"><title>${escapeHtml(content.subject)}</title></head>
<body style="margin:0;background:${PAPER};color:${INK};font:17px/1.6 ${TEXT_FONT}">
<div style="max-width:34em;margin:0 auto;padding:32px 24px">
<div style="border-left:2px solid ${EDGE};padding-left:24px">
<h1 style="font-size:24px;line-height:1.25;font-weight:normal;margin:0 0 24px">${escapeHtml(content.subject)}</h1>
${[greet(content.name), ...content.paragraphs].map(paragraph).join('\n')}
${action}${afterwards}
</div>
<p style="margin:32px 0 0;padding-top:12px;border-top:1px solid ${RULE};color:${MUTED};font-size:13px"><a href="${escapeHtml(baseUrl)}" style="color:${MUTED}">Slipstone</a>${unsubscribe}</p>
</div></body></html>
`;
}

export function escapeHtml(text: string): string {
  const names: Readonly<Record<string, string>> = {
    '&': '&amp;',
    '<': '&lt;',
    '>': '&gt;',
    '"': '&quot;',
    "'": '&#39;',
  };
  return text.replace(/[&<>"']/g, (letter) => names[letter] ?? letter);
}

function greet(name: string | null): string {
  return name ? `Dear ${name},` : 'Hello,';
}
