import { Link, useSearchParams } from 'react-router-dom';
import type { FindAnswer } from '../../../shared/schemas/find';
import { useGroup } from '../../api/use-group';
import { Coordinates } from '../../components/coordinates';
import { EmptyState } from '../../components/empty-state';
import { Loading } from '../../components/loading';
import { MarginNote } from '../../components/margin';
import { Page } from '../../components/page';
import { ProblemNotice } from '../../components/problem-notice';
import { formatSepArcsec } from '../../components/quantities';
import { Section } from '../../components/section';
import { SelectField } from '../../components/select-field';
import { Stamp } from '../../components/stamp';
import { useFind, useStamps } from './use-objects';

const RADII_ARCSEC = [2, 5, 10, 30, 60, 300, 900];
const FIRST_RADIUS_ARCSEC = 10;

/** What the find field leads to: exact objects, and near misses beside them. */
export function FindPage() {
  const group = useGroup();
  const [search, setSearch] = useSearchParams();
  const q = search.get('q')?.trim() ?? '';
  const radiusArcsec = Number(search.get('radiusArcsec') ?? FIRST_RADIUS_ARCSEC);
  const found = useFind(group.slug, q, radiusArcsec);
  return (
    <Page
      title={q === '' ? 'Find' : `Find “${q}”`}
      margin={
        <>
          <MarginNote title="What is understood">
            A name in any spelling (case, blanks, leading zeros and Greek letters do not matter), a position in degrees or
            sexagesimal, or an object number like #12.
          </MarginNote>
          <MarginNote title="Near misses">
            Names that only look alike are shown with what differs. They are never taken in place of what you asked for.
          </MarginNote>
        </>
      }
    >
      {q === '' && <EmptyState title="Nothing asked yet">Type a name, a position or an object number above.</EmptyState>}
      {q !== '' && found.isPending && <Loading rows={4} label="Looking" />}
      {found.isError && <ProblemNotice problem={found.error} retry={() => void found.refetch()} />}
      {found.data !== undefined && (
        <Answer
          answer={found.data}
          onRadius={(radius) => setSearch({ q, radiusArcsec: String(radius) }, { replace: true })}
        />
      )}
    </Page>
  );
}

function Answer({ answer, onRadius }: { answer: FindAnswer; onRadius: (radiusArcsec: number) => void }) {
  const { position } = answer;
  return (
    <div className="grid gap-8">
      {position !== null && (
        <div className="flex flex-wrap items-end gap-4">
          <p>
            Read as the position <Coordinates raDeg={position.raDeg} decDeg={position.decDeg} />
          </p>
          <div className="w-40">
            <SelectField
              label="Radius"
              value={String(position.radiusArcsec)}
              options={[...new Set([...RADII_ARCSEC, position.radiusArcsec])].map((radius) => ({
                value: String(radius),
                label: formatSepArcsec(radius),
              }))}
              onChange={(event) => onRadius(Number(event.target.value))}
            />
          </div>
        </div>
      )}
      {answer.forwardedFrom !== null && (
        <p role="status" className="border-l-2 border-accent pl-3">
          #{answer.forwardedFrom} is now part of #{answer.exact[0]?.number}.
        </p>
      )}
      {answer.exact.length > 0 && (
        <Section title={answer.read === 'position' ? 'Objects within the radius, nearest first' : 'Found'}>
          <Matches matches={answer.exact} />
        </Section>
      )}
      {answer.exact.length === 0 && <NothingFound read={answer.read} />}
      {answer.nearMisses.length > 0 && (
        <Section title="Not taken, only near">
          <ul className="grid gap-1">
            {answer.nearMisses.map((miss, i) => (
              <li key={i} className="grid gap-x-4 border-b border-rule py-1 sm:grid-cols-[14rem_8rem_1fr]">
                <Link to={`../objects/${miss.number}`} className="text-link">
                  {miss.alias}
                </Link>
                <span className="text-muted">#{miss.number}</span>
                <span>{miss.reason}</span>
              </li>
            ))}
          </ul>
        </Section>
      )}
    </div>
  );
}

function NothingFound({ read }: { read: FindAnswer['read'] }) {
  const what = {
    number: 'No object of the group has this number.',
    position: 'No object lies within the radius. Try a larger one.',
    name: 'No object bears exactly this name.',
  }[read];
  return <EmptyState title="Nothing found">{what}</EmptyState>;
}

function Matches({ matches }: { matches: FindAnswer['exact'] }) {
  const { slug } = useGroup();
  const stamps = useStamps(slug);
  return (
    <ul className="grid gap-1">
      {matches.map((match) => (
        <li
          key={match.number}
          className="flex flex-wrap items-center gap-x-4 gap-y-1 border-b border-rule py-1.5"
        >
          <Link to={`../objects/${match.number}`} className="font-medium text-link">
            #{match.number} {match.name}
          </Link>
          {match.alias !== null && match.alias !== match.name && <span className="text-muted">as {match.alias}</span>}
          <Coordinates raDeg={match.raDeg} decDeg={match.decDeg} errArcsec={match.errArcsec} />
          {match.sepArcsec !== null && <span>{formatSepArcsec(match.sepArcsec)}</span>}
          <span className="flex gap-1">
            {match.catalogues.map((label) => (
              <Stamp key={label} catalogue={{ label, ordinal: stamps.get(label) ?? 0 }} />
            ))}
          </span>
        </li>
      ))}
    </ul>
  );
}
