import { useQuery, useQueryClient } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { today, type Today } from '../../../shared/schemas/today';
import { keys } from '../../api/query-keys';
import { groupPath, request } from '../../api/request';
import { useGroup } from '../../api/use-group';
import { JobCard } from '../../components/job-card';
import { JobStateChip } from '../../components/job-state-chip';
import { LinkButton } from '../../components/link-button';
import { Loading } from '../../components/loading';
import { MarginNote } from '../../components/margin';
import { Page } from '../../components/page';
import { ProblemNotice } from '../../components/problem-notice';
import { formatCount, plural } from '../../components/quantities';
import { RelativeTime } from '../../components/relative-time';
import { Section } from '../../components/section';

const SHOWN_FAILURES = 5;

/** What waits, what runs, what changed. */
export function TodayPage() {
  const group = useGroup();
  const state = useQuery({
    queryKey: keys.today(group.slug),
    queryFn: ({ signal }) => request({ path: groupPath(group.slug, 'today'), answer: today, signal }),
  });
  return (
    <Page
      title="Today"
      lead={group.name}
      margin={
        <>
          <MarginNote title="Where things are">
            Catalogues come in, a cross-match proposes pairs, people or a rule decide them, and objects are what follows.
            The find field above takes a name, a position or an object number.
          </MarginNote>
          <MarginNote title="Keys">Press ? on any page for its keys, / for the find field.</MarginNote>
        </>
      }
    >
      {state.isPending && <Loading rows={6} label="Loading today" />}
      {state.isError && <ProblemNotice problem={state.error} retry={() => void state.refetch()} />}
      {state.data !== undefined && (state.data.catalogues === 0 ? <FirstSteps /> : <Overview state={state.data} />)}
    </Page>
  );
}

/** The way for a group that has nothing yet. */
function FirstSteps() {
  const group = useGroup();
  return (
    <Section title="Three steps to a merged table">
      <ol className="grid gap-4">
        <Step number={1} title="Add two catalogues">
          <p>Tables of sources from two instruments or two papers. Idem shows how it understands each before it imports.</p>
          {group.can('contributor') && (
            <LinkButton kind="main" to="../catalogues/new">
              Add a catalogue
            </LinkButton>
          )}
        </Step>
        <Step number={2} title="Cross-match them">
          <p>Choose a radius; look at the separations and at how many pairs chance alone would make.</p>
        </Step>
        <Step number={3} title="Decide and download">
          <p>A rule decides the clear pairs, people the doubtful ones. Every object keeps all its names.</p>
        </Step>
      </ol>
    </Section>
  );
}

function Step({ number, title, children }: { number: number; title: string; children: React.ReactNode }) {
  return (
    <li className="grid grid-cols-[2rem_1fr] gap-x-2">
      <span className="text-xl text-accent">{number}</span>
      <div className="grid justify-items-start gap-2">
        <h3 className="font-medium">{title}</h3>
        {children}
      </div>
    </li>
  );
}

function Overview({ state }: { state: Today }) {
  return (
    <div className="grid gap-8">
      <dl className="grid grid-cols-2 gap-4 sm:grid-cols-4">
        <Figure name="catalogues" value={state.catalogues} to="../catalogues" />
        <Figure name="sources" value={state.sources} to="../catalogues" />
        <Figure name="objects" value={state.objects} to="../objects" />
        <Figure name="of several sources" value={state.mergedObjects} to="../objects?minEntries=2" />
      </dl>
      <Waiting state={state} />
      <Jobs state={state} />
      <Section title="What changed">
        {state.recent.length === 0 ? (
          <p className="text-muted">Nothing yet.</p>
        ) : (
          <ol className="grid gap-1">
            {state.recent.map((event, i) => (
              <li key={i} className="grid gap-x-4 border-b border-rule py-1 sm:grid-cols-[9rem_1fr]">
                <span className="text-muted">
                  <RelativeTime at={event.at} />
                </span>
                <span>
                  {event.by}:{' '}
                  {event.link === null ? (
                    event.what
                  ) : (
                    <Link to={`../${event.link}`} className="text-link">
                      {event.what}
                    </Link>
                  )}
                </span>
              </li>
            ))}
          </ol>
        )}
      </Section>
    </div>
  );
}

function Figure({ name, value, to }: { name: string; value: number; to: string }) {
  return (
    <div className="grid border-l-2 border-rule pl-3">
      <dt className="order-2 text-muted">{name}</dt>
      <dd className="text-xl">
        <Link to={to} className="text-ink no-underline hover:underline">
          {formatCount(value)}
        </Link>
      </dd>
    </div>
  );
}

function Waiting({ state }: { state: Today }) {
  const open = state.undecided.filter((run) => run.undecided > 0);
  const nothing = open.length === 0 && state.conflicts === 0 && state.contestedNames === 0 && state.setAsideRows === 0;
  return (
    <Section title="Waiting for the group">
      {nothing && <p className="text-muted">Nothing waits.</p>}
      <ul className="grid gap-2">
        {open.map((run) => (
          <li key={run.run} className="flex flex-wrap items-center gap-x-3 gap-y-1">
            <Link to={`../review/${run.run}`} className="text-link">
              {plural(run.undecided, 'undecided candidate', 'undecided candidates')}
            </Link>
            <span>
              in cross-match {run.run}
              {run.title === '' ? '' : `, ${run.title}`}
            </span>
            <span className="text-muted">{formatCount(run.crowded)} crowded</span>
          </li>
        ))}
        {state.conflicts > 0 && (
          <li>
            <Link to="../review" className="text-link">
              {plural(state.conflicts, 'conflict', 'conflicts')}
            </Link>{' '}
            between verdicts
          </li>
        )}
        {state.contestedNames > 0 && (
          <li>
            {plural(state.contestedNames, 'name points', 'names point')} at two live
            objects
          </li>
        )}
        {state.setAsideRows > 0 && (
          <li>
            <Link to="../catalogues" className="text-link">
              {plural(state.setAsideRows, 'row', 'rows')} set aside
            </Link>{' '}
            at import
          </li>
        )}
      </ul>
    </Section>
  );
}

function Jobs({ state }: { state: Today }) {
  const { slug } = useGroup();
  const client = useQueryClient();
  const running = state.jobs.filter((job) => job.finishedAt === null);
  const failed = state.jobs.filter((job) => job.state === 'failed').slice(0, SHOWN_FAILURES);
  if (running.length === 0 && failed.length === 0) return null;
  return (
    <Section title="Jobs">
      <div className="grid gap-3">
        {running.map((job) => (
          <JobCard
            key={job.id}
            group={slug}
            jobId={job.id}
            onFinished={() => void client.invalidateQueries({ queryKey: keys.group(slug) })}
          />
        ))}
        {failed.map((job) => (
          <p key={job.id} className="flex flex-wrap items-center gap-2">
            <JobStateChip state={job.state} /> {job.title}: {job.error?.detail}
            {job.link !== null && (
              <Link to={`../${job.link}`} className="text-link">
                look
              </Link>
            )}
          </p>
        ))}
      </div>
    </Section>
  );
}
