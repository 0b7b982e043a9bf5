import { createServer, type RequestListener, type Server } from 'node:http';

/** Longer than proxies and clients keep a connection that nobody uses, so that none is closed under a request. */
const IDLE_MS = 75_000;

/** The HTTP server of the product, not yet listening. */
export function httpServer(listener: RequestListener): Server {
  const server = createServer(listener);
  // a cube takes minutes on a slow line: the time limit is on silence, not on the whole request
  server.requestTimeout = 0;
  server.keepAliveTimeout = IDLE_MS;
  return server;
}
