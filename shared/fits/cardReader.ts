import * as fitsjs from 'fitsjs';

/**
 * One card of a header as it was read.
 *
 * `value` is what the card says: text, a number (NaN when the field is not a number at all), a logical, or null
 * for a card without a value. `field` is the value as written, which keeps the digits of a 64-bit integer.
 */
export interface ReadCard {
  keyword: string;
  value: string | number | boolean | null;
  field: string;
  comment: string;
}

/** Where fitsjs hangs its classes: on its exports, or, where the bundler gives scripts no exports, on the global. */
const { Header: FitsjsHeader } = (fitsjs.astro ??
  (globalThis as unknown as { astro: typeof fitsjs.astro }).astro)!.FITS;

/** Stands for a slash inside quotes, which fitsjs would take for the start of the comment. */
const SLASH = '\u0001';
const NUMBER = /^[+-]?(\d+\.?\d*|\.\d+)([EeDd][+-]?\d+)?$/;

/**
 * fitsjs' header class, given one tidied card at a time. It separates keyword, value and commentary and types the
 * value; what it misreads is tidied before (slashes and comments, D exponents) or checked after (numbers with text
 * behind them). Its own checks are left out: they refuse BITPIX 64 and print warnings about the order of cards.
 */
class TidiedHeader extends FitsjsHeader {
  private last: unknown = null;

  override validate(_keyword: string, value: unknown): unknown {
    return value;
  }

  override set(_keyword: string, value: unknown): void {
    this.last = value;
  }

  /** Type the value field of one card. */
  typed(keyword: string, field: string): string | number | boolean | null {
    if (field === '') return null;
    this.last = null;
    const quoted = field.startsWith("'");
    const tidy = quoted ? field.replaceAll('/', SLASH) : field.replace(/[dD]/, 'E');
    this.readLine(`${keyword.padEnd(8)}= ${tidy}`);
    if (typeof this.last === 'string') {
      if (!quoted) return this.last === 'T';
      return this.last.replaceAll(SLASH, '/').replaceAll("''", "'");
    }
    return NUMBER.test(field) ? (this.last as number) : NaN;
  }
}

/**
 * Read the cards of one header.
 *
 * CONTINUE cards are joined to the string before them; HIERARCH cards keep their whole name as keyword, which is
 * none of the standard's; COMMENT, HISTORY and blank cards carry their text as the comment.
 *
 * @param text the header as text, 80 characters a card, up to END
 */
export function readCards(text: string): ReadCard[] {
  const header = new TidiedHeader('');
  const cards: ReadCard[] = [];
  for (let at = 0; at < text.length; at += 80) {
    const card = text.slice(at, at + 80);
    const keyword = card.slice(0, 8).trimEnd();
    if (keyword === 'END' && card.trimEnd() === 'END') break;
    if (keyword === 'CONTINUE' && joinContinued(cards.at(-1), card)) continue;
    const hierarch = keyword === 'HIERARCH' ? card.indexOf('=') : -1;
    if (hierarch > 0) {
      const { field, comment } = splitField(card.slice(hierarch + 1));
      cards.push({
        keyword: card.slice(0, hierarch).trim(),
        value: header.typed('HIERARCH', field),
        field,
        comment,
      });
    } else if (card.slice(8, 10) === '= ' && !isCommentary(keyword)) {
      const { field, comment } = splitField(card.slice(10));
      cards.push({ keyword, value: header.typed(keyword, field), field, comment });
    } else if (card.trim() !== '') {
      cards.push({ keyword, value: null, field: '', comment: card.slice(8).trimEnd() });
    }
  }
  return cards;
}

const isCommentary = (keyword: string) => keyword === 'COMMENT' || keyword === 'HISTORY' || keyword === '';

/** Value and comment of a card: they part at the first slash outside quotes. */
function splitField(rest: string): { field: string; comment: string } {
  const start = rest.length - rest.trimStart().length;
  let end = start;
  if (rest[start] === "'") {
    end = start + 1;
    while (end < rest.length && !(rest[end] === "'" && rest[end + 1] !== "'"))
      end += rest[end] === "'" ? 2 : 1;
    if (end >= rest.length) return { field: `${rest.slice(start).trimEnd()}'`, comment: '' }; // no closing quote
    end += 1;
    const slash = rest.indexOf('/', end);
    return { field: rest.slice(start, end), comment: slash < 0 ? '' : rest.slice(slash + 1).trim() };
  }
  const slash = rest.indexOf('/');
  return slash < 0
    ? { field: rest.trim(), comment: '' }
    : { field: rest.slice(0, slash).trim(), comment: rest.slice(slash + 1).trim() };
}

/** Join a CONTINUE card to the string it goes on; false when there is none that ends in an ampersand. */
function joinContinued(previous: ReadCard | undefined, card: string): boolean {
  if (typeof previous?.value !== 'string' || !previous.value.endsWith('&')) return false;
  const { field, comment } = splitField(card.slice(8));
  if (!field.startsWith("'")) return false;
  previous.value = previous.value.slice(0, -1) + field.slice(1, -1).trimEnd().replaceAll("''", "'");
  previous.field = `'${previous.value}'`;
  if (comment !== '') previous.comment = `${previous.comment} ${comment}`.trim();
  return true;
}
