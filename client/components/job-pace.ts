import type { Job } from '../../shared/schemas/job';

/** Progress of a job as numbers to show; null where nothing can be said. */
export function jobPace(
  job: Pick<Job, 'state' | 'done' | 'total' | 'ratePerSecond' | 'startedAt' | 'finishedAt'>,
): {
  /** Share done, 0..1. */
  share: number | null;
  secondsLeft: number | null;
  /** Run time of a finished job. */
  tookSeconds: number | null;
} {
  const { state, done, total, ratePerSecond, startedAt, finishedAt } = job;
  const share = total === null || total <= 0 ? null : Math.min(1, Math.max(0, done / total));
  const paced = state === 'running' && total !== null && ratePerSecond !== null && ratePerSecond > 0;
  return {
    share,
    secondsLeft: paced && done < total ? (total - done) / ratePerSecond : null,
    tookSeconds:
      startedAt === null || finishedAt === null
        ? null
        : Math.max(0, (Date.parse(finishedAt) - Date.parse(startedAt)) / 1000),
  };
}
