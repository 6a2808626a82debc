import { Link } from 'react-router-dom';
import type { Job } from '../../shared/schemas/job';
import { isFinished, useCancelJob, useJob } from '../api/job-progress';
import { useGroup } from '../api/use-group';
import { Button } from './button';
import { JobStateChip } from './job-state-chip';
import { jobPace } from './job-pace';
import { Loading } from './loading';
import { ProblemNotice } from './problem-notice';
import { formatCount, formatDuration } from './quantities';
import { RelativeTime } from './relative-time';

/** A job as it goes on; follows it by itself. */
export function JobCard({
  group,
  jobId,
  onFinished,
}: {
  group: string;
  jobId: string;
  onFinished?: (job: Job) => void;
}) {
  const { can } = useGroup();
  const { job, problem, retry } = useJob(group, jobId, onFinished);
  const cancel = useCancelJob(group);
  if (job === null) {
    return problem === null ? (
      <Loading label="Loading the job" rows={2} />
    ) : (
      <ProblemNotice problem={problem} retry={retry} />
    );
  }
  return (
    <JobCardView
      job={job}
      group={group}
      onCancel={can('contributor') ? () => cancel.mutate(job.id) : undefined}
      cancelling={cancel.isPending}
      problem={cancel.error}
    />
  );
}

/** The card itself: progress, rate, time left, cancel, and the error of a failed job. */
export function JobCardView({
  job,
  group,
  onCancel,
  cancelling = false,
  problem = null,
}: {
  job: Job;
  /** Slug, for the link to the result. */
  group: string;
  onCancel?: () => void;
  cancelling?: boolean;
  /** Why cancelling failed. */
  problem?: unknown;
}) {
  const finished = isFinished(job);
  return (
    <article className="grid gap-2 border border-rule bg-raised p-4" aria-label={job.title}>
      <div className="flex flex-wrap items-center justify-between gap-x-4 gap-y-2">
        <p className="font-bold">
          {job.link !== null && job.state === 'done' ? (
            <Link to={`/g/${group}/${job.link}`}>{job.title}</Link>
          ) : (
            job.title
          )}
        </p>
        <div className="flex items-center gap-3">
          <JobStateChip state={job.state} />
          {!finished && onCancel !== undefined && (
            <Button size="sm" busy={cancelling} busyLabel="Stopping" onClick={onCancel}>
              Cancel
            </Button>
          )}
        </div>
      </div>
      {!finished && <JobBar job={job} />}
      <JobFigures job={job} />
      {job.error !== null && (
        <div className="border-l-4 border-bad pl-3">
          <p className="text-bad">{job.error.detail}</p>
          {job.error.hint !== null && <p className="prose-serif">{job.error.hint}</p>}
          <p className="text-xs text-muted">Code: {job.error.code}</p>
        </div>
      )}
      {problem !== null && problem !== undefined && <ProblemNotice problem={problem} />}
    </article>
  );
}

function JobBar({ job }: { job: Job }) {
  const { share } = jobPace(job);
  return (
    <div
      role="progressbar"
      aria-label={job.title}
      aria-valuemin={0}
      aria-valuemax={100}
      aria-valuenow={share === null ? undefined : Math.floor(share * 100)}
      className="h-2 overflow-hidden border border-edge"
    >
      {share === null ? (
        job.state === 'running' && <div className="working-line h-full w-1/4 bg-accent" />
      ) : (
        <div className="h-full bg-accent" style={{ width: `${share * 100}%` }} />
      )}
    </div>
  );
}

function JobFigures({ job }: { job: Job }) {
  const { share, secondsLeft, tookSeconds } = jobPace(job);
  const parts: string[] = [];
  if (job.total !== null) parts.push(`${formatCount(job.done)} of ${formatCount(job.total)}`);
  else if (job.done > 0) parts.push(formatCount(job.done));
  if (share !== null && !isFinished(job)) parts.push(`${Math.floor(share * 100)}\u00a0%`);
  if (job.ratePerSecond !== null && job.state === 'running')
    parts.push(`${formatCount(job.ratePerSecond)} per second`);
  if (secondsLeft !== null) parts.push(`${formatDuration(secondsLeft)} left`);
  if (tookSeconds !== null) parts.push(`took ${formatDuration(tookSeconds)}`);
  return (
    <p className="flex flex-wrap gap-x-4 text-muted">
      {job.message !== null && <span className="text-ink">{job.message}</span>}
      {parts.map((part) => (
        <span key={part}>{part}</span>
      ))}
      {job.finishedAt !== null && <RelativeTime at={job.finishedAt} />}
    </p>
  );
}
