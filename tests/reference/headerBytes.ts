/** Bytes of a header made of these cards, END added where it is missing, padded to whole blocks. */
export function headerBytesOf(cards: string[]): Uint8Array {
  const all = cards.at(-1)?.trimEnd() === 'END' ? cards : [...cards, 'END'];
  const text = all.map((card) => card.padEnd(80)).join('');
  return new TextEncoder().encode(text.padEnd(Math.ceil(text.length / 2880) * 2880));
}
