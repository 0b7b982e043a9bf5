import { Problem } from '@/shared/contract/problem';
import { readCards, type ReadCard } from './cardReader';
import { headerText } from './headerScan';

/**
 * A FITS header to ask questions of. Of cards with the same keyword the first counts. Every answer that rests on a
 * doubtful card (twice there, lower-case exponent, bytes outside ASCII) is remembered in `cautions`.
 */
export class Header {
  readonly cards: ReadCard[];
  private readonly first = new Map<string, ReadCard>();
  private readonly twice = new Set<string>();
  private readonly doubts = new Map<string, string>();

  /** @param bytes whole blocks of one header, END included */
  constructor(bytes: Uint8Array) {
    this.cards = readCards(headerText(bytes));
    for (const card of this.cards) {
      if (card.keyword === '' || card.keyword === 'COMMENT' || card.keyword === 'HISTORY') continue;
      const before = this.first.get(card.keyword);
      if (!before) this.first.set(card.keyword, card);
      else if (before.field !== card.field) this.twice.add(card.keyword);
    }
    const odd = this.cards
      .filter((c) => /\ufffd/.test(c.keyword + c.field + c.comment))
      .map((c) => c.keyword || 'blank');
    if (odd.length > 0) {
      const names = [...new Set(odd)].slice(0, 5).join(', ');
      this.doubts.set(
        'ascii',
        `Bytes outside ASCII stand in the header (${names}); they are shown as \ufffd.`,
      );
    }
  }

  /** Sentences about the cards that were asked for so far. */
  get cautions(): string[] {
    return [...this.doubts.values()];
  }

  has(keyword: string): boolean {
    return (this.first.get(keyword)?.value ?? null) !== null;
  }

  /** Text of a card; null when it is missing or empty; a number is given as written. */
  text(keyword: string): string | null {
    const card = this.asked(keyword);
    if (!card) return null;
    const text = typeof card.value === 'string' ? card.value.trim() : card.field;
    return text === '' ? null : text;
  }

  /** @throws Problem fits-card when the card does not hold a number */
  number(keyword: string): number | null {
    const card = this.asked(keyword);
    if (!card) return null;
    if (typeof card.value !== 'number' || !Number.isFinite(card.value)) {
      throw new Problem('fits-card', `${keyword} must be a number; the header says ${card.field}.`, {
        card: keyword,
      });
    }
    if (/[ed]/.test(card.field)) {
      this.doubts.set(
        `${keyword} exponent`,
        `${keyword} = ${card.field} has a lower-case exponent; it is read as one.`,
      );
    }
    return card.value + 0; // never -0, which JSON loses
  }

  /** A number the product can do without: null, and a caution, when the card holds something else. */
  optionalNumber(keyword: string): number | null {
    try {
      return this.number(keyword);
    } catch {
      this.doubts.set(
        `${keyword} number`,
        `${keyword} is not a number (${this.text(keyword)}) and is ignored.`,
      );
      return null;
    }
  }

  /** @throws Problem fits-card when the card does not hold an integer */
  integer(keyword: string): number | null {
    const value = this.number(keyword);
    if (value !== null && !Number.isInteger(value)) {
      throw new Problem('fits-card', `${keyword} must be a whole number; the header says ${value}.`, {
        card: keyword,
      });
    }
    return value;
  }

  /** An integer of up to 64 bits, in decimal. @throws Problem fits-card */
  wideInteger(keyword: string): bigint | null {
    const value = this.integer(keyword);
    if (value === null) return null;
    const field = this.first.get(keyword)!.field;
    return /^[+-]?\d+$/.test(field) ? BigInt(field.replace(/^\+/, '')) : BigInt(value);
  }

  logical(keyword: string): boolean | null {
    const value = this.asked(keyword)?.value;
    return typeof value === 'boolean' ? value : null;
  }

  /** Lines of HISTORY. */
  get history(): string[] {
    return this.cards.filter((c) => c.keyword === 'HISTORY').map((c) => c.comment);
  }

  private asked(keyword: string): ReadCard | null {
    const card = this.first.get(keyword);
    if (!card || card.value === null) return null;
    if (this.twice.has(keyword)) {
      this.doubts.set(
        `${keyword} twice`,
        `${keyword} stands in the header more than once; the first counts: ${card.field}.`,
      );
    }
    return card;
  }
}
