// Serves a built site: `node src/cli/serve.mjs ENTRY`. Plain JavaScript, so that the server needs no loader.
//
// The site's adapter takes the caller's address from X-Forwarded-For, whoever sent it; then a guesser has a new address
// for every guess. Here the header is believed only from proxies that the settings name, and else set aside.
import { createServer } from 'node:http';
import { pathToFileURL } from 'node:url';
import proxyAddress from 'proxy-addr';

const [entry] = process.argv.slice(2);
if (!entry) {
  console.error('Usage: node src/cli/serve.mjs ENTRY');
  process.exit(1);
}

const host = process.env.HOST ?? '127.0.0.1';
const port = Number(process.env.PORT ?? 4321);
const proxies = (process.env.TRUSTED_PROXIES ?? '')
  .split(',')
  .map((one) => one.trim())
  .filter(Boolean);
// Addresses, networks (10.0.0.0/8) and the names loopback, linklocal, uniquelocal; a mistake in them stops the start.
const isTrusted = proxyAddress.compile(proxies);

process.env.ASTRO_NODE_AUTOSTART = 'disabled';
const { handler } = await import(pathToFileURL(entry).href);

const server = createServer((request, response) => {
  const address = proxyAddress(request, isTrusted);
  delete request.headers['x-forwarded-for'];
  if (address && address !== request.socket.remoteAddress) request.headers['x-forwarded-for'] = address;
  handler(request, response);
});
server.listen(port, host);
server.on('error', (error) => {
  console.error(error.message);
  process.exit(1);
});

for (const signal of /** @type {const} */ (['SIGINT', 'SIGTERM']))
  process.on(signal, () => {
    // What is being answered may finish; nothing new begins.
    server.close(() => process.exit(0));
    server.closeIdleConnections();
    setTimeout(() => process.exit(0), 2000).unref();
  });
