// @ts-check
import { portState } from '../machine/ports.mjs';
import { Stop } from '../machine/stop.mjs';
import { setTimeout as sleep } from 'node:timers/promises';

/**
 * Where the server will listen, checked before any slow work.
 * @param {NodeJS.ProcessEnv} env
 * @param {{ patience?: number }} [options]  ms to wait for a port that a killed start is about to give back
 */
export async function chooseAddress(env, { patience = 0 } = {}) {
  const host = env.HOST || '127.0.0.1';
  const port = Number(env.PORT || 3000);
  if (!Number.isInteger(port) || port < 1 || port > 65535)
    throw new Stop('PORT must be a whole number from 1 to 65535.');
  let state = await portState(port, host);
  for (let waited = 0; state === 'taken' && waited < patience; waited += 200) {
    await sleep(200);
    state = await portState(port, host);
  }
  if (state === 'taken')
    throw new Stop(
      `Port ${port} is taken by another program. Stop that one, or choose another port:\n  PORT=${port + 1} npm start`,
    );
  if (state === 'not-allowed')
    throw new Stop(`Port ${port} is kept for the system. Choose one from 1024 on:\n  PORT=3000 npm start`);
  const shown = host === '0.0.0.0' || host === '::' ? 'localhost' : host.includes(':') ? `[${host}]` : host;
  return { host, port, url: `http://${shown}:${port}` };
}

/**
 * Waits until the server answers, or gives up when `over` says that it has ended.
 * @param {string} url @param {() => boolean} over
 */
export async function untilServed(url, over) {
  for (let waited = 0; waited < 60_000; waited += 100) {
    if (over()) return false;
    const answer = await fetch(`${url}/api/v1/health`).catch(() => null);
    await answer?.arrayBuffer();
    if (answer?.ok) return true;
    await sleep(100);
  }
  throw new Stop('The server did not answer within 60 s.');
}
