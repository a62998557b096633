/** Text without what a database cannot keep: NUL, and halves of surrogate pairs, such as a pasted piece of an emoji leaves. */
export function storableText(text: string): string {
  return text.replaceAll('\0', '').replaceAll(/\p{Cs}/gu, '');
}
