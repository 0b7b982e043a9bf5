const { getDefaultConfig } = require('expo/metro-config');
const http = require('node:http');
const config = getDefaultConfig(__dirname);
// Metro must not crawl or bundle server code and data.
const here = __dirname.replace(/[.*+?^${}()|[\]\\]/g, '\\$&'); // anchored: packages have folders called server too
config.resolver.blockList = [
  new RegExp(`^${here}/(server|workers|migrations|tests|data|dist[^/]*)/.*`),
].concat(config.resolver.blockList ?? []);
// A module runs when it is first used, so that a page does not wait for what other screens are made of.
config.transformer.getTransformOptions = async () => ({
  transform: { experimentalImportSupport: false, inlineRequires: true },
});
// In dev the page comes from Metro; /api and /auth go on to Express (API_PORT).
const target = { host: '127.0.0.1', port: Number(process.env.API_PORT ?? 3000) };
config.server.enhanceMiddleware = (metro) => (req, res, next) => {
  if (!/^\/(api|auth)(\/|\?|$)/.test(req.url ?? '')) return metro(req, res, next);
  const up = http.request(
    {
      ...target,
      path: req.url,
      method: req.method,
      headers: { ...req.headers, 'x-forwarded-host': req.headers.host ?? '', 'x-forwarded-proto': 'http' },
    },
    (r) => {
      res.writeHead(r.statusCode ?? 502, r.headers);
      r.pipe(res);
    },
  );
  up.on('error', (e) => {
    if (!res.headersSent) res.writeHead(502, { 'content-type': 'application/problem+json' });
    res.end(
      JSON.stringify({
        type: 'about:blank',
        title: 'The API is not running',
        status: 502,
        detail: String(e),
      }),
    );
  });
  res.on('close', () => up.destroy());
  req.pipe(up);
};
module.exports = config;
