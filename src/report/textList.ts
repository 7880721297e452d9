import { markupText } from '../draw/plainText.ts';

/** A bulleted list of escaped texts, or `empty` as a paragraph where there are none. */
export function textList(texts: readonly string[], empty: string): string {
  if (texts.length > 0) return `<ul>${texts.map((text) => `<li>${markupText(text)}</li>`).join('')}</ul>`;
  return empty === '' ? '' : `<p>${markupText(empty)}</p>`;
}
