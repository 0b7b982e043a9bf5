/** `cubes/6f1c….fits`: folders and a name from letters, digits, dot, dash and underscore; none begins with a dot. */
const KEY = /^(?:[A-Za-z0-9_-][A-Za-z0-9._-]*\/)+[A-Za-z0-9_-][A-Za-z0-9._-]*$/;

/**
 * Refuses a key that could name anything outside the store. Keys are made by us from ids, so a bad one is a mistake
 * in the code and not something a person did: a RangeError, which becomes a 500.
 */
export function checkKey(key: string): string {
  if (!KEY.test(key) || key.length > 200)
    throw new RangeError(`Not a key of the cube store: ${JSON.stringify(key)}`);
  return key;
}
