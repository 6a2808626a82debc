import pino from 'pino';
import { openDatabase } from '../db/client';
import { localFileStorage } from './adapters/file-storage';
import { readConfig, type Config } from './config';
import type { Context } from './context';
import { openJobFeed } from './services/job-feed';

/** A little less than the launcher waits before it kills. */
const STOP_LIMIT_MS = 9500;

/** Opens what a process works with, from a configuration. */
export function openContext(config: Config, poolSize: number): Context {
  const log = pino({ level: config.logLevel });
  const database = openDatabase(config.databaseUrl, (error) => log.warn({ err: error }, 'idle connection lost'), poolSize);
  return { config, database, files: localFileStorage(config.filesDir), jobFeed: openJobFeed({ config, log }), log };
}

export async function closeContext(context: Context): Promise<void> {
  await context.jobFeed.close();
  await context.database.close();
}

/** Opens the context of a process from its environment. */
export function contextFromEnvironment(poolSize: number): Context {
  return openContext(readConfig(process.env), poolSize);
}

/** Runs `stop` once on SIGTERM, SIGINT, or when the launcher that holds the other end of the channel is gone. */
export function onShutdown(context: Context, stop: () => Promise<void>): void {
  let stopping = false;
  const begin = (why: string) => {
    if (stopping) return;
    stopping = true;
    context.log.info({ why }, 'stopping');
    // A stop that hangs (because the database is gone, say) must not leave an orphan.
    setTimeout(() => process.exit(1), STOP_LIMIT_MS).unref();
    stop().then(
      () => process.exit(0),
      (error: unknown) => {
        context.log.error({ err: error }, 'could not stop cleanly');
        process.exit(1);
      },
    );
  };
  process.on('SIGTERM', () => begin('SIGTERM'));
  process.on('SIGINT', () => begin('SIGINT'));
  process.on('disconnect', () => begin('the launcher is gone'));
}
