// @ts-check
/** Something a person has to know or do before we can go on: said in plain words, without a stack. */
export class Stop extends Error {
  /** @param {string} message */
  constructor(message) {
    super(message);
    this.name = 'Stop';
  }
}

/** @param {unknown} error @returns {string} */
export const explain = (error) =>
  error instanceof Stop
    ? error.message
    : error instanceof Error
      ? (error.stack ?? error.message)
      : String(error);
