import { Link } from 'react-router-dom';
import type { DeskTask, RunDetail } from '../../../shared/schemas/run';
import { useGroup } from '../../api/use-group';
import { MarginNote } from '../../components/margin';
import { formatFixed, formatSepArcsec } from '../../components/quantities';
import { RelativeTime } from '../../components/relative-time';
import { VerdictMark } from '../../components/verdict-mark';
import { epochGaps } from '../../components/radius-advice';
import { epochText } from '../../components/run-words';

/** Verdicts so far on the pair, and what the desk shows. */
export function DeskMargin({ task, run }: { task: DeskTask; run: RunDetail }) {
  const { slug, can } = useGroup();
  const pair = [task.candidate.a.catalogue, task.candidate.b.catalogue];
  const gaps = epochGaps(run.catalogues.filter(({ label }) => pair.includes(label)));
  return (
    <>
      <MarginNote title="Verdicts on this pair">
        <PastVerdicts past={task.past} />
      </MarginNote>
      {gaps.map(({ a, b, years }) => (
        <MarginNote key={`${a.label} ${b.label}`} title="Epochs differ">
          {a.label} stands at {epochText(a.epochYear)}, {b.label} at {epochText(b.epochYear)}. Positions are
          not moved to one epoch: in {years.toFixed(1)} years a motion of 100 mas a year makes{' '}
          {formatFixed(years * 0.1, 2)}″.
        </MarginNote>
      ))}
      <MarginNote title="What is drawn">
        <p>
          Sources of the compared catalogues within {formatSepArcsec(task.fieldRadiusArcsec)}; zoom out for
          those further off. Filled marks are the pair and other candidates of either, open ones the rest.
          Press a filled mark to go to that candidate.
        </p>
        <p>
          The error beside the separation is that of both positions along the line between them. Verdicts: the
          latest on a pair counts, earlier ones stay in the log.
        </p>
      </MarginNote>
      <MarginNote title="Caution">
        A close position is evidence, not proof. &lsquo;Unsure&rsquo; is a verdict too: the pair leaves the
        queue of undecided ones and can be found again under <Link to={`/g/${slug}/review`}>Review</Link>.
      </MarginNote>
      {can('contributor') && (
        <MarginNote title="Keys">
          <p className="font-mono text-xs">
            S D U verdict · 1 2 3 grade · N next · B back · Z undo · R remark · ? list
          </p>
        </MarginNote>
      )}
    </>
  );
}

function PastVerdicts({ past }: { past: DeskTask['past'] }) {
  if (past.length === 0) return <p>None yet.</p>;
  return (
    <ol className="grid list-none gap-2 pl-0">
      {past.map((verdict) => (
        <li key={verdict.id} className="grid gap-0.5 border-b border-rule pb-2 font-mono text-sm">
          <span className="flex flex-wrap items-center gap-x-2">
            <VerdictMark
              value={verdict.value}
              grade={verdict.grade}
              automatic={verdict.origin === 'policy'}
            />
            {verdict.takenBack && <span className="text-muted">taken back</span>}
          </span>
          <span className="text-xs text-muted">
            {verdict.by}, <RelativeTime at={verdict.at} />
          </span>
          {verdict.flags.length > 0 && <span className="text-xs">{verdict.flags.join(', ')}</span>}
          {verdict.remark !== '' && <span className="prose-serif whitespace-pre-wrap">{verdict.remark}</span>}
        </li>
      ))}
    </ol>
  );
}
