// @ts-check
import { resolve } from 'node:path';
import { fileURLToPath } from 'node:url';

/** The folder of this checkout, wherever the command was given. */
export const root = resolve(fileURLToPath(import.meta.url), '../../..');
