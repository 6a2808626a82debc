import { Fragment } from 'react';
import { Link } from 'react-router-dom';
import type { Conflict } from '../../../shared/schemas/verdict';
import { useGroup } from '../../api/use-group';
import { Button } from '../../components/button';
import { VerdictSign } from '../../components/verdict-mark';
import { sourceName } from './source-name';

type ChainLink = Conflict['a'];

/** One conflict in sentences: what was said, what it would join, what forbids it. */
export function ConflictItem({
  conflict,
  onTakeBack,
}: {
  conflict: Conflict;
  onTakeBack: (value: 'same' | 'different') => void;
}) {
  const group = useGroup();
  const { a, b, forbiddenA, forbiddenB, chain, objectNumbers } = conflict;
  return (
    <li className="grid gap-2 border border-l-4 border-edge border-l-warn bg-raised p-4">
      <p className="flex flex-wrap items-center gap-x-2 gap-y-1">
        <span className="inline-flex items-center gap-1.5 text-good">
          <VerdictSign value="same" /> same
        </span>
        <Name link={a} /> <span className="text-muted">and</span> <Name link={b} />
        <span className="font-bold text-warn">not carried out</span>
      </p>
      <p className="flex flex-wrap items-center gap-x-2 gap-y-1">
        <span className="inline-flex items-center gap-1.5 text-bad">
          <VerdictSign value="different" /> different
        </span>
        <Name link={forbiddenA} /> <span className="text-muted">and</span> <Name link={forbiddenB} />
        <span className="text-muted">forbids it</span>
      </p>
      <div>
        <span className="text-muted">It would close this chain of &lsquo;same&rsquo;: </span>
        {chain.map((link, index) => (
          <Fragment key={link.entryId}>
            {index > 0 && <span className="text-muted"> = </span>}
            <Name link={link} />
          </Fragment>
        ))}
      </div>
      <div className="flex flex-wrap items-center justify-between gap-x-4 gap-y-2">
        <p>
          {objectNumbers.map((number, index) => (
            <Fragment key={number}>
              {index > 0 && ', '}
              <Link to={`/g/${group.slug}/objects/${number}`}>object {number}</Link>
            </Fragment>
          ))}
        </p>
        {group.can('curator') && (
          <span className="screen-only flex flex-wrap gap-2">
            <Button size="sm" onClick={() => onTakeBack('same')}>
              Take back &lsquo;same&rsquo;
            </Button>
            <Button size="sm" onClick={() => onTakeBack('different')}>
              Take back &lsquo;different&rsquo;
            </Button>
          </span>
        )}
      </div>
    </li>
  );
}

function Name({ link }: { link: ChainLink }) {
  return <span className="whitespace-nowrap">{sourceName(link)}</span>;
}
