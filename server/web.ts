import { createServer } from 'node:http';
import { createApp } from './app';
import { closeContext, contextFromEnvironment, onShutdown } from './process';

const POOL_SIZE = 12;
const DRAIN_MS = 8000;
/** Longer than common proxies keep an idle connection, so that it is never this side that closes a reused one. */
const KEEP_ALIVE_MS = 65_000;

/** The HTTP process. */
const context = contextFromEnvironment(POOL_SIZE);
const server = createServer(createApp(context));

server.keepAliveTimeout = KEEP_ALIVE_MS;
server.on('error', (error) => {
  context.log.fatal({ err: error }, 'cannot listen');
  process.exit(1);
});
server.listen(context.config.port, context.config.host, () => {
  context.log.info({ ready: true, address: server.address() }, 'web process listens');
});

onShutdown(context, async () => {
  const closed = new Promise<void>((resolve) => server.close(() => resolve()));
  server.closeIdleConnections();
  // Event streams never end by themselves; they are cut after the others have had time to finish.
  const cut = setTimeout(() => server.closeAllConnections(), DRAIN_MS);
  await closed;
  clearTimeout(cut);
  await closeContext(context);
});
