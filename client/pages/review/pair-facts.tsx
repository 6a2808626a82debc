import type { ReactNode } from 'react';
import type { Candidate } from '../../../shared/schemas/run';
import { formatAngle, formatSepArcsec } from '../../components/quantities';
import { Ruler } from '../../components/ruler';
import { StatusChip } from '../../components/status-chip';
import { separationErrorArcsec } from './separation-error';

/** Separation with its error, position angle, ranks and rivals of a candidate. */
export function PairFacts({ candidate, radiusArcsec }: { candidate: Candidate; radiusArcsec: number }) {
  const { a, b, sepArcsec, paDeg, rankA, rankB, rivalsA, rivalsB, mutualBest } = candidate;
  const errArcsec = separationErrorArcsec(a, b, paDeg);
  const clear = mutualBest && rivalsA === 0 && rivalsB === 0;
  return (
    <div className="grid gap-x-8 gap-y-2 sm:grid-cols-[auto_minmax(0,1fr)] sm:items-center">
      <p className="flex flex-wrap items-baseline gap-x-3">
        <span className="text-xl font-bold">{formatSepArcsec(sepArcsec)}</span>
        <span className="text-muted">
          {errArcsec === null ? 'error not stated' : `± ${formatSepArcsec(errArcsec)} (1σ)`}
        </span>
      </p>
      <Ruler
        marks={[{ sepArcsec, errArcsec, label: 'separation', emphasis: true }]}
        limitArcsec={radiusArcsec}
      />
      <div className="flex flex-wrap items-center gap-x-6 gap-y-1 sm:col-span-2">
        <dl className="flex flex-wrap gap-x-6 gap-y-1">
          <Fact name="position angle">{paDeg === null ? 'not defined' : formatAngle(paDeg)}</Fact>
          <Fact name={`rank for ${a.catalogue}`}>{rankA}</Fact>
          <Fact name={`rank for ${b.catalogue}`}>{rankB}</Fact>
          <Fact name="rivals">
            {rivalsA} / {rivalsB}
          </Fact>
        </dl>
        <span className="flex flex-wrap gap-2">
          {mutualBest ? (
            <StatusChip>mutual best</StatusChip>
          ) : (
            <StatusChip tone="warn">not mutual best</StatusChip>
          )}
          {clear ? <StatusChip>clear</StatusChip> : <StatusChip tone="warn">crowded</StatusChip>}
        </span>
      </div>
    </div>
  );
}

function Fact({ name, children }: { name: string; children: ReactNode }) {
  return (
    <div className="flex gap-2">
      <dt className="text-muted">{name}</dt>
      <dd>{children}</dd>
    </div>
  );
}
