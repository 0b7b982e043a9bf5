/** The little of SVG that a figure needs, as text. */
export type Attributes = Record<string, string | number | undefined>;

/** Text as it may stand in an element or an attribute; characters that XML has no place for are left out. */
export const escaped = (text: string): string =>
  text
    .replace(/[\u0000-\u0008\u000b\u000c\u000e-\u001f\ufffe\uffff]/g, '')
    .replace(/&/g, '&amp;')
    .replace(/</g, '&lt;')
    .replace(/>/g, '&gt;')
    .replace(/"/g, '&quot;');

/** A length to a thousandth: finer than any printer. */
export const short = (value: number): string => String(Number(value.toFixed(3)) + 0);

/** One element; children are elements already, text must be escaped before. */
export function element(name: string, attributes: Attributes, children: string | string[] = ''): string {
  const written = Object.entries(attributes)
    .filter(([, value]) => value !== undefined)
    .map(([key, value]) => ` ${key}="${typeof value === 'number' ? short(value) : escaped(value!)}"`)
    .join('');
  const inside = Array.isArray(children) ? children.join('') : children;
  return inside === '' ? `<${name}${written}/>` : `<${name}${written}>${inside}</${name}>`;
}

/** A line of text at a place. */
export const words = (text: string, x: number, y: number, more: Attributes = {}): string =>
  element('text', { x, y, ...more }, escaped(text));
