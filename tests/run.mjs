// Runs every check of the project, or the parts named as arguments. Plain Node: the dependencies may not be there yet.
import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { ensureDependencies, requireNode } from '../server/bootstrap/dependencies.mjs';
import { say, SetupProblem } from '../server/bootstrap/say.mjs';
import { ensureChromium, ensurePostgres } from '../server/bootstrap/system-packages.mjs';
import { runProgramPart, runVitestPart } from './run/parts.mjs';

const ROOT = fileURLToPath(new URL('..', import.meta.url));
const NODE_MODULES = path.join(ROOT, 'node_modules');

/** In the order in which they run: the quick ones first. */
const PARTS = {
  typecheck: () =>
    runProgramPart('typecheck', ROOT, [path.join(NODE_MODULES, 'typescript', 'bin', 'tsc'), '--noEmit']),
  lint: () =>
    runProgramPart('lint', ROOT, [path.join(NODE_MODULES, 'eslint', 'bin', 'eslint.js'), ...LINT_ARGUMENTS]),
  unit: () => runVitestPart('unit', ROOT),
  outside: () => runVitestPart('outside', ROOT),
  api: () => runVitestPart('api', ROOT),
  browser: () => runVitestPart('browser', ROOT),
};
const LINT_ARGUMENTS = [
  '.',
  '--cache',
  '--cache-location',
  'node_modules/.cache/eslint/',
  '--max-warnings',
  '0',
];
const NEED_POSTGRES = ['api', 'browser'];
const NEED_CHROMIUM = ['browser'];

function askedParts() {
  const asked = process.argv.slice(2);
  const unknown = asked.filter((name) => !(name in PARTS));
  if (unknown.length > 0) {
    throw new SetupProblem(
      `There is no part "${unknown.join('", "')}". Parts: ${Object.keys(PARTS).join(', ')}.`,
    );
  }
  return Object.keys(PARTS).filter((name) => asked.length === 0 || asked.includes(name));
}

function prepare(parts) {
  requireNode();
  ensureDependencies(ROOT);
  if (parts.some((name) => NEED_POSTGRES.includes(name))) ensurePostgres('npm test');
  if (parts.some((name) => NEED_CHROMIUM.includes(name))) ensureChromium('npm test');
}

async function runParts(parts) {
  const total = { passed: 0, failed: 0, skipped: 0 };
  const failures = [];
  for (const name of parts) {
    say(`\n== ${name}`);
    const result = await PARTS[name]();
    for (const key of Object.keys(total)) total[key] += result[key];
    failures.push(...result.failures.map((failure) => `${name}: ${failure}`));
  }
  if (total.passed + total.failed === 0) failures.push('no test ran');
  if (failures.length > 0) console.log(`\nFailed:\n${failures.map((failure) => `  ${failure}`).join('\n')}`);
  finish(total, failures.length === 0);
}

/** The last line is read by machines. */
function finish(total, isGood) {
  const skipped = total.skipped > 0 ? `, ${total.skipped} skipped` : '';
  console.log(`\n${total.passed} passed, ${total.failed} failed${skipped}`);
  process.exitCode = isGood ? 0 : 1;
}

try {
  const parts = askedParts();
  prepare(parts);
  await runParts(parts);
} catch (error) {
  say(error instanceof SetupProblem ? error.message : String(error?.stack ?? error));
  finish({ passed: 0, failed: 1, skipped: 0 }, false);
}
