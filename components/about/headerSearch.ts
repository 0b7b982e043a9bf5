import type { CubeHeader } from '@/shared/contract/cubes';

type Card = CubeHeader['cards'][number];

/** A card's value as it is read. */
export const cardValue = ({ value }: Card): string =>
  value === null || value === undefined
    ? ''
    : typeof value === 'boolean'
      ? value
        ? 'T'
        : 'F'
      : String(value);

/** The cards that hold every word that is searched for, in keyword, value or comment, whatever the case. */
export function searchCards(cards: readonly Card[], text: string): { card: Card; index: number }[] {
  const words = text.toLowerCase().split(/\s+/).filter(Boolean);
  return cards
    .map((card, index) => ({ card, index }))
    .filter(({ card }) => {
      const said = `${card.keyword} ${cardValue(card)} ${card.comment ?? ''}`.toLowerCase();
      return words.every((word) => said.includes(word));
    });
}
