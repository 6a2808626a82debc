import type { RunDetail } from '../../../shared/schemas/run';
import { MarginNote } from '../../components/margin';
import { formatCount, formatSepArcsec } from '../../components/quantities';
import { RelativeTime } from '../../components/relative-time';
import { Stamp } from '../../components/stamp';
import { epochGaps } from '../../components/radius-advice';
import { epochText, FEW_PAIRS } from '../../components/run-words';

/** Where a cross-match comes from, and what its numbers mean. */
export function RunMargin({ run }: { run: RunDetail }) {
  const gaps = epochGaps(run.catalogues);
  return (
    <>
      <MarginNote title="Where it comes from">
        <p>
          Started by {run.createdBy} <RelativeTime at={run.createdAt} />
          {run.finishedAt !== null && run.state === 'done' && (
            <>
              , done <RelativeTime at={run.finishedAt} />
            </>
          )}
          . Idem {run.softwareVersion}.
        </p>
        <ul className="mt-2 grid list-none gap-1.5 pl-0 font-mono text-xs">
          {run.catalogues.map((catalogue) => (
            <li key={catalogue.label}>
              <Stamp catalogue={catalogue} size={18} withLabel />
              <span className="block text-muted">
                revision {catalogue.revision}, {formatCount(catalogue.sources)} sources, epoch{' '}
                {epochText(catalogue.epochYear)}
              </span>
            </li>
          ))}
        </ul>
      </MarginNote>
      <MarginNote title="What the numbers mean">
        <p>
          A candidate is a pair within {formatSepArcsec(run.radiusArcsec)}. <em>Mutual best</em>: each is the
          nearest candidate of the other. <em>Crowded</em>: one of the two has further candidates, its rivals.
        </p>
        <p>
          Chance pairs are measured: the first catalogue is shifted eight times and compared again. Where a
          shifted field leaves the other catalogue, chance is underestimated.
        </p>
        <p>
          The rule begins at the separation that would hold 99 % of the true pairs, if they scatter about zero
          as their median says. A median offset makes it larger than it need be.
        </p>
        <p>Numbers from fewer than {FEW_PAIRS} pairs are marked: they say little.</p>
      </MarginNote>
      {gaps.length > 0 && (
        <MarginNote title="Epochs differ">
          {gaps.map(({ a, b, years }) => (
            <p key={`${a.label} ${b.label}`}>
              {a.label} and {b.label} are {years.toFixed(1)} years apart. Proper motions are not applied: fast
              sources lie off, or outside.
            </p>
          ))}
        </MarginNote>
      )}
      <MarginNote title="Caution">
        A close position is evidence, not proof. Nothing here takes the place of reading the catalogues&rsquo;
        own papers.
      </MarginNote>
    </>
  );
}
