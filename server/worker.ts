import { startWorker } from './jobs/worker';
import { closeContext, contextFromEnvironment, onShutdown } from './process';

const POOL_SIZE = 8;

/** The job process: any number of them may run, on any host. */
const context = contextFromEnvironment(POOL_SIZE);
const worker = await startWorker(context);
context.log.info({ ready: true }, 'worker process waits for jobs');

onShutdown(context, async () => {
  await worker.stop();
  await closeContext(context);
});
