import { z } from 'zod';
import { job, jobList } from '../../shared/schemas/job';
import { groupParams, groupRoute, type Route } from '../route';
import * as jobs from '../services/jobs';

const JOBS = '/api/groups/:group/jobs';
const jobParams = groupParams({ jobId: z.uuid() });
const KEEP_ALIVE_MS = 15_000;

export const jobRoutes: Route[] = [
  groupRoute({
    role: 'reader',
    method: 'get',
    path: JOBS,
    summary: 'The newest jobs',
    query: z.strictObject({
      which: z.enum(['open', 'all']).default('all'),
      limit: z.coerce.number().int().min(1).max(100).default(20),
    }),
    answer: jobList,
    run: async ({ context, actor, query }) => ({ items: await jobs.listJobs(context, actor, query.which, query.limit) }),
  }),
  groupRoute({
    role: 'reader',
    method: 'get',
    path: `${JOBS}/:jobId`,
    summary: 'State and progress of a job',
    params: jobParams,
    answer: job,
    run: ({ context, actor, params }) => jobs.getJob(context, actor, params.jobId),
  }),
  groupRoute({
    role: 'reader',
    method: 'get',
    path: `${JOBS}/:jobId/events`,
    summary: 'Progress of a job as server-sent events; ends when the job ends',
    params: jobParams,
    answer: 'stream',
    async run({ context, actor, params, req, res }) {
      const first = await jobs.getJob(context, actor, params.jobId);
      res.writeHead(200, {
        'Content-Type': 'text/event-stream',
        'Cache-Control': 'no-cache, no-transform',
        'X-Accel-Buffering': 'no',
      });
      await sendUntilFinished(first, {
        look: () => jobs.getJob(context, actor, params.jobId),
        listen: (heard) => context.jobFeed.listen(params.jobId, heard),
        write: (text) => res.write(text),
        onGone: (stop) => req.on('close', stop),
      });
      res.end();
    },
  }),
  groupRoute({
    role: 'contributor',
    method: 'post',
    path: `${JOBS}/:jobId/cancel`,
    summary: 'Ask a job to stop',
    params: jobParams,
    answer: job,
    run: ({ context, actor, params }) => jobs.cancelJob(context, actor, params.jobId),
  }),
];

interface Feed {
  look(): Promise<z.infer<typeof job>>;
  listen(heard: () => void): () => void;
  write(text: string): boolean;
  onGone(stop: () => void): void;
}

/** Writes the job at each announcement until it has finished or the listener is gone. */
function sendUntilFinished(first: z.infer<typeof job>, feed: Feed): Promise<void> {
  return new Promise((resolve) => {
    let looking = false;
    let again = false;
    const keepAlive = setInterval(() => feed.write(': still here\n\n'), KEEP_ALIVE_MS);
    const unlisten = feed.listen(() => void look());
    feed.onGone(stop);
    send(first);
    // The job may have changed between the first look and the start of listening.
    void look();

    function stop(): void {
      clearInterval(keepAlive);
      unlisten();
      resolve();
    }
    function send(state: z.infer<typeof job>): void {
      feed.write(`data: ${JSON.stringify(state)}\n\n`);
      if (state.finishedAt !== null) stop();
    }
    async function look(): Promise<void> {
      if (looking) {
        again = true;
        return;
      }
      looking = true;
      try {
        do {
          again = false;
          send(await feed.look());
        } while (again);
      } catch {
        stop();
      } finally {
        looking = false;
      }
    }
  });
}
