import { EventEmitter } from 'node:events';
import { Logger, run, type WorkerEvents } from 'graphile-worker';
import { z } from 'zod';
import type { Context } from '../context';
import { QUEUE_TASK, runJob } from '../services/jobs';
import { beat, reapDeadWorkers } from '../services/worker-life';
import { JOB_KIND_WORK } from './kinds';

const CONCURRENCY = 2;
const BEAT_EVERY_MS = 2000;

/** The queue's levels of importance in the words of our log. */
const LOG_LEVELS = { error: 'error', warning: 'warn', info: 'info', debug: 'debug' } as const;

const queuePayload = z.strictObject({ jobId: z.uuid(), groupId: z.number().int() });

/** Starts taking jobs from the queue; `stop` lets running jobs end and hands back the rest. */
export async function startWorker(context: Context): Promise<{ stop(): Promise<void> }> {
  const events: WorkerEvents = new EventEmitter();
  const workerIds = new Set<string>();
  events.on('worker:create', ({ worker }) => workerIds.add(worker.workerId));
  events.on('worker:release', ({ worker }) => workerIds.delete(worker.workerId));
  const watch = async () => {
    await beat(context, [...workerIds]);
    const dead = await reapDeadWorkers(context);
    if (dead.length > 0) context.log.warn({ dead }, 'jobs of dead workers handed back');
  };
  await watch();
  const runner = await run({
    pgPool: context.database.pool,
    concurrency: CONCURRENCY,
    noHandleSignals: true,
    events,
    logger: new Logger(() => (level, message) => context.log[LOG_LEVELS[level]]({ queue: true }, message)),
    taskList: {
      [QUEUE_TASK]: (payload) => runJob(context, queuePayload.parse(payload), JOB_KIND_WORK),
    },
  });
  await watch();
  const timer = setInterval(() => {
    watch().catch((error: unknown) => context.log.warn({ err: error }, 'no sign of life could be given'));
  }, BEAT_EVERY_MS);
  return {
    async stop() {
      clearInterval(timer);
      await runner.stop();
    },
  };
}
