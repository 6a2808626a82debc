import { useEffect, useRef, useState } from 'react';
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { job as jobSchema, type Job } from '../../shared/schemas/job';
import { jsonOrNull } from './problem-error';
import { keys } from './query-keys';
import { groupPath, request } from './request';

const POLL_MS = 2000;

/** True once nothing about the job will change any more. */
export function isFinished(job: Job): boolean {
  return job.state === 'done' || job.state === 'failed' || job.state === 'cancelled';
}

/** The job in one event's data; null when it cannot be read. */
export function jobOfEvent(data: string): Job | null {
  const parsed = jobSchema.safeParse(jsonOrNull(data));
  return parsed.success ? parsed.data : null;
}

/** The later of two states of one job: a slow answer must not undo what an event has already told. */
export function laterJob(known: Job | undefined, heard: Job): Job {
  if (known === undefined || known.id !== heard.id) return heard;
  if (isFinished(known) && !isFinished(heard)) return known;
  const begun = known.state === 'running' && heard.state === 'queued';
  return begun || (known.state === heard.state && known.done > heard.done) ? known : heard;
}

/**
 * A job as it goes on: server-sent events, and a look every two seconds while they do not come through.
 * `onFinished` is called once per job, with the finished job; also when it had finished before the first look,
 * because a short job may be over before its card is drawn.
 */
export function useJob(group: string, jobId: string | null, onFinished?: (job: Job) => void) {
  const queryClient = useQueryClient();
  const [live, setLive] = useState(false);
  const query = useQuery({
    queryKey: keys.job(group, jobId ?? ''),
    enabled: jobId !== null,
    queryFn: async ({ signal }) => {
      const heard = await request({ path: groupPath(group, 'jobs', jobId ?? ''), answer: jobSchema, signal });
      return laterJob(queryClient.getQueryData<Job>(keys.job(group, heard.id)), heard);
    },
    refetchInterval: ({ state }) => (live || (state.data && isFinished(state.data)) ? false : POLL_MS),
  });
  const finished = query.data !== undefined && isFinished(query.data);
  const listening = jobId !== null && query.data !== undefined && !finished;

  useEffect(() => {
    if (!listening) return;
    const events = new EventSource(groupPath(group, 'jobs', jobId, 'events'));
    events.onopen = () => setLive(true);
    events.onerror = () => setLive(false);
    events.onmessage = (event: MessageEvent<string>) => {
      const heard = jobOfEvent(event.data);
      if (heard === null) return;
      queryClient.setQueryData<Job>(keys.job(group, jobId), (known) => laterJob(known, heard));
    };
    return () => {
      events.close();
      setLive(false);
    };
  }, [group, jobId, listening, queryClient]);

  useFinished(query.data, onFinished);
  return { job: query.data ?? null, live, problem: query.error, retry: () => void query.refetch() };
}

function useFinished(job: Job | undefined, onFinished: ((job: Job) => void) | undefined): void {
  const toldId = useRef<string | null>(null);
  useEffect(() => {
    if (job === undefined || !isFinished(job) || toldId.current === job.id) return;
    toldId.current = job.id;
    onFinished?.(job);
  }, [job, onFinished]);
}

/** Asks a job to stop; the card shows what it answers. */
export function useCancelJob(group: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (jobId: string) =>
      request({ method: 'POST', path: groupPath(group, 'jobs', jobId, 'cancel'), answer: jobSchema }),
    onSuccess: (job) => queryClient.setQueryData<Job>(keys.job(group, job.id), job),
  });
}
