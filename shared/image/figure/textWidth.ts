/** Widths of letters in ems, on the mean of text faces: layout must not need a screen. */
const NARROW = /[iljtfrI.,;:'’|!()[\]·′″°ʰᵐˢ ]/;
const WIDE = /[mwMWΘ@%—…]/;
const CAPITAL = /[A-ZΑ-Ω]/;

/** About how wide a text is; within a tenth for the product's faces. */
export function textWidth(text: string, size: number): number {
  let ems = 0;
  for (const letter of text)
    ems += NARROW.test(letter) ? 0.31 : WIDE.test(letter) ? 0.86 : CAPITAL.test(letter) ? 0.66 : 0.56;
  return ems * size;
}

/** A text in lines of at most a width; its own line breaks are kept, a word that is longer stands alone. */
export function wrapped(text: string, width: number, size: number): string[] {
  if (text.trim() === '') return [];
  return text
    .trim()
    .split('\n')
    .flatMap((paragraph) => {
      const lines: string[] = [];
      let line = '';
      for (const word of paragraph.split(/\s+/)) {
        const longer = line ? `${line} ${word}` : word;
        if (line && textWidth(longer, size) > width) {
          lines.push(line);
          line = word;
        } else line = longer;
      }
      return [...lines, line];
    });
}
