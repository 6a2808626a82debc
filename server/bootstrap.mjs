// The first step of every command, in plain Node: on a fresh machine neither dependencies nor PostgreSQL exist yet.
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { ensureDependencies, requireNode } from './bootstrap/dependencies.mjs';
import { runChild } from './bootstrap/run-child.mjs';
import { orExplain, say } from './bootstrap/say.mjs';
import { ensurePostgres } from './bootstrap/system-packages.mjs';

const ROOT = fileURLToPath(new URL('..', import.meta.url));

const COMMANDS = {
  start: { program: 'server/start.ts', typed: 'npm start' },
  dev: { program: 'server/dev.ts', typed: 'npm run dev' },
  bench: { program: 'tests/bench/run.ts', typed: 'npm run bench' },
  'check-registry': { program: 'server/check-registry.ts', typed: 'npm run check:registry' },
};

const [name = '', ...args] = process.argv.slice(2);
const command = COMMANDS[name];
if (command === undefined) {
  say(`Usage: node server/bootstrap.mjs ${Object.keys(COMMANDS).join(' | ')}`);
  process.exit(2);
}

await orExplain(() => {
  requireNode();
  ensureDependencies(ROOT);
  if (!process.env.IDEM_DATABASE_URL) ensurePostgres(command.typed);
});

process.exitCode = await runChild(
  process.execPath,
  ['--import', 'tsx', path.join(ROOT, command.program), ...args],
  { cwd: ROOT },
);
