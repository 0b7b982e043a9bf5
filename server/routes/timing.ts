import type { RequestHandler } from 'express';

/** Say in every answer how long the server took for it, milliseconds, as browsers and benchmarks can read it. */
export const timing: RequestHandler = (_req, res, next) => {
  const began = performance.now();
  const writeHead = res.writeHead.bind(res) as (...args: unknown[]) => typeof res;
  res.writeHead = ((...args: unknown[]) => {
    if (!res.headersSent)
      res.setHeader('Server-Timing', `total;dur=${(performance.now() - began).toFixed(1)}`);
    return writeHead(...args);
  }) as typeof res.writeHead;
  next();
};
