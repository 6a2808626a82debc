import { spawn } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';

/** A part that hangs must not hang the whole run. */
const LIMIT_MS = 30 * 60_000;
const PASSED_ON = ['SIGINT', 'SIGTERM', 'SIGHUP'];

/**
 * @typedef {{ passed: number, failed: number, skipped: number, failures: string[] }} PartResult
 */

/**
 * A program that is right or wrong as a whole counts as one test.
 *
 * @returns {Promise<PartResult>}
 */
export async function runProgramPart(name, root, args) {
  const how = await runNode(root, args);
  return how === 'ended with 0' ? counted(1, 0, 0, []) : counted(0, 1, 0, [`${name} ${how}`]);
}

/**
 * Runs a project of vite.config.ts and counts its tests from Vitest's JSON report.
 *
 * @returns {Promise<PartResult>}
 */
export async function runVitestPart(name, root) {
  const folder = mkdtempSync(path.join(tmpdir(), 'idem-report-'));
  const reportFile = path.join(folder, 'report.json');
  try {
    const how = await runNode(root, [
      path.join(root, 'node_modules', 'vitest', 'vitest.mjs'),
      'run',
      ...['--project', name, '--reporter=default', '--reporter=json', `--outputFile.json=${reportFile}`],
    ]);
    const report = existsSync(reportFile)
      ? JSON.parse(readFileSync(reportFile, 'utf8'))
      : { testResults: [] };
    return judge(report.testResults, how, root);
  } finally {
    rmSync(folder, { recursive: true, force: true });
  }
}

/** Counts the tests of a report; a file, a hook or a runner that failed without a failed test counts as one too. */
export function judge(testFiles, how, root) {
  const failures = [];
  let passed = 0;
  let skipped = 0;
  for (const { name, status, assertionResults, message } of testFiles) {
    const file = path.relative(root, name);
    const failed = assertionResults.filter((test) => test.status === 'failed');
    failures.push(...failed.map((test) => `${file}: ${test.fullName}`));
    if (status === 'failed' && failed.length === 0)
      failures.push(`${file}: ${firstLine(message) || 'could not run'}`);
    const passedHere = assertionResults.filter((test) => test.status === 'passed').length;
    passed += passedHere;
    skipped += assertionResults.length - passedHere - failed.length;
  }
  if (failures.length === 0 && how !== 'ended with 0') failures.push(`the runner ${how}`);
  if (failures.length === 0 && passed === 0) failures.push('no test ran');
  return counted(passed, failures.length, skipped, failures);
}

function firstLine(text) {
  return (text ?? '').split('\n')[0];
}

function counted(passed, failed, skipped, failures) {
  return { passed, failed, skipped, failures };
}

/** Runs a Node program without standard input; tells how it ended. */
function runNode(root, args) {
  // A group of its own, so that the limit ends whatever the program started as well.
  const child = spawn(process.execPath, args, {
    cwd: root,
    stdio: ['ignore', 'inherit', 'inherit'],
    detached: true,
    env: { ...process.env, CI: '1', ...(process.stdout.isTTY ? {} : { NO_COLOR: '1' }) },
  });
  const passOn = (signal) => {
    process.kill(-child.pid, signal);
    process.exit(1);
  };
  for (const signal of PASSED_ON) process.on(signal, passOn);
  return new Promise((resolve) => {
    const limit = setTimeout(() => process.kill(-child.pid, 'SIGKILL'), LIMIT_MS);
    const done = (how) => {
      clearTimeout(limit);
      for (const signal of PASSED_ON) process.off(signal, passOn);
      resolve(how);
    };
    child.once('error', (error) => done(`could not be run: ${error.message}`));
    child.once('exit', (code, signal) =>
      done(signal === null ? `ended with ${code}` : `was ended by ${signal}`),
    );
  });
}
