/** The part of fitsjs 0.6.6 that Outswell uses; the package brings no types. */
declare module 'fitsjs' {
  /** Reads header cards into `cards`; COMMENT and HISTORY collect lines, the rest one value each. */
  export class FitsjsHeader {
    constructor(block: string);
    /** Reads one 80-character card; calls `validate`, then `set`, for a card with a value. */
    readLine(card: string): void;
    validate(keyword: string, value: unknown): unknown;
    set(keyword: string, value: unknown, comment?: string): unknown;
  }
  export const astro: { FITS: { Header: typeof FitsjsHeader } } | undefined;
}
