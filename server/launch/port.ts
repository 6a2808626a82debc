import { createServer } from 'node:net';
import { freePort } from '../../db/cluster-server';
import { StartProblem } from './say';

const PORTS_TO_TRY = 50;

function isFree(port: number, host: string): Promise<boolean> {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', (error: NodeJS.ErrnoException) => {
      if (error.code === 'EADDRINUSE') resolve(false);
      else reject(new StartProblem(`Cannot listen on ${host}, port ${port}: ${error.message}`));
    });
    probe.listen(port, host, () => probe.close(() => resolve(true)));
  });
}

/**
 * The port to listen on: `asked` (a variable's text) if given, where 0 stands for any free one; otherwise `usual` or
 * the next free one after it.
 */
export async function choosePort(asked: string | undefined, usual: number, host: string): Promise<number> {
  if (asked === undefined || asked === '') return nextFree(usual, host);
  const port = Number(asked);
  if (!Number.isInteger(port) || port < 0 || port > 65535) {
    throw new StartProblem(`IDEM_PORT must be a port number from 0 to 65535, not "${asked}".`);
  }
  if (port === 0) return freePort();
  if (await isFree(port, host)) return port;
  throw new StartProblem(
    `Port ${port} is in use. Name another one in IDEM_PORT, or leave IDEM_PORT out to use the next free one.`,
  );
}

async function nextFree(first: number, host: string): Promise<number> {
  for (let port = first; port < first + PORTS_TO_TRY; port += 1) {
    if (await isFree(port, host)) return port;
  }
  throw new StartProblem(
    `No port from ${first} to ${first + PORTS_TO_TRY - 1} is free. Name one in IDEM_PORT.`,
  );
}
