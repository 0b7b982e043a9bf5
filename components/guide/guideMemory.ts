/** Whether a person has seen the guide, or refused it: kept in this browser, for each person. */
const keyOf = (personId: string): string => `outswell.guide.${personId}`;
/** For everybody who uses this browser; tests set it. */
const ALL = keyOf('all');

export function guideSeen(personId: string): boolean {
  try {
    const { localStorage } = globalThis;
    return localStorage.getItem(keyOf(personId)) !== null || localStorage.getItem(ALL) !== null;
  } catch {
    return true; // without a memory it would come back each time
  }
}

export function keepGuideSeen(personId: string): void {
  try {
    globalThis.localStorage.setItem(keyOf(personId), 'seen');
  } catch {
    /* then it was not offered either */
  }
}
