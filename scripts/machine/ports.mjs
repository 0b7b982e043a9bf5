// @ts-check
import { createServer } from 'node:net';

/** A port on loopback that was free a moment ago. @returns {Promise<number>} */
export const freePort = () => bound(0, '127.0.0.1');

/**
 * Whether a server could listen there now.
 * @param {number} port @param {string} host
 * @returns {Promise<'free' | 'taken' | 'not-allowed'>}
 */
export async function portState(port, host) {
  try {
    await bound(port, host);
    return 'free';
  } catch (error) {
    const { code } = /** @type {NodeJS.ErrnoException} */ (error);
    if (code === 'EADDRINUSE') return 'taken';
    if (code === 'EACCES') return 'not-allowed';
    throw error;
  }
}

/** @param {number} port @param {string} host @returns {Promise<number>} */
const bound = (port, host) =>
  new Promise((done, fail) => {
    const server = createServer();
    server.once('error', fail);
    server.listen(port, host, () => {
      const address = server.address();
      server.close(() => done(typeof address === 'object' && address ? address.port : port));
    });
  });
