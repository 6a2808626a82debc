import { useMemo, type ReactNode } from 'react';
import type { PairStatistics } from '../../../shared/schemas/run';
import { Histogram } from '../../charts/histogram';
import { sumBelow } from '../../charts/histogram-shape';
import { formatCount, formatFixed, formatSepArcsec, formatShare } from '../../components/quantities';
import { Ruler } from '../../components/ruler';
import { StatusChip } from '../../components/status-chip';
import { FEW_PAIRS, pairName } from '../../components/run-words';

/** What a run found between two catalogues; the limit is that of the policy rule and can be dragged. */
export function PairDiagnosis({
  pair,
  radiusArcsec,
  limitArcsec,
  onLimitChange,
}: {
  pair: PairStatistics;
  radiusArcsec: number;
  limitArcsec: number | null;
  onLimitChange: (sepArcsec: number) => void;
}) {
  const { edgesArcsec, counts, chance } = pair.histogram;
  const overlay = useMemo(
    () => (chance.length === counts.length ? { label: 'By chance, measured', values: chance } : undefined),
    [chance, counts],
  );
  if (pair.candidates === 0) {
    return (
      <p>
        No source of {pair.a} lies within {formatSepArcsec(radiusArcsec)} of one of {pair.b}.
      </p>
    );
  }
  return (
    <div className="grid min-w-0 gap-5">
      <Histogram
        title={`Separations of ${pairName(pair)}`}
        edges={edgesArcsec}
        counts={counts}
        countsLabel="Candidates"
        overlay={overlay}
        xLabel="Separation"
        xUnit="arcsec"
        yLabel="Candidates per bin"
        limit={
          limitArcsec === null
            ? undefined
            : { value: Math.min(limitArcsec, radiusArcsec), label: 'rule', onChange: onLimitChange }
        }
      />
      {limitArcsec !== null && <BelowLimit pair={pair} limitArcsec={limitArcsec} />}
      <PairFigures pair={pair} radiusArcsec={radiusArcsec} />
    </div>
  );
}

function BelowLimit({ pair, limitArcsec }: { pair: PairStatistics; limitArcsec: number }) {
  const { edgesArcsec, counts, chance } = pair.histogram;
  const below = sumBelow(edgesArcsec, counts, limitArcsec);
  const byChance = sumBelow(edgesArcsec, chance, limitArcsec);
  return (
    <p aria-live="off">
      Below {formatSepArcsec(limitArcsec)}: about <strong>{formatCount(below)}</strong>{' '}
      {Math.round(below) === 1 ? 'candidate' : 'candidates'}, of which chance alone would make{' '}
      <strong>{formatFixed(byChance, byChance < 10 ? 1 : 0)}</strong>
      {below >= 1 && ` (${formatShare(Math.min(1, byChance / below))})`}.{' '}
      {below < FEW_PAIRS && <FewPairs count={Math.round(below)} />}
    </p>
  );
}

/** Marks a number that rests on few pairs. */
function FewPairs({ count }: { count: number }) {
  return (
    <StatusChip tone="warn" icon="!">
      from {formatCount(count)} {count === 1 ? 'pair' : 'pairs'}: says little
    </StatusChip>
  );
}

function PairFigures({ pair, radiusArcsec }: { pair: PairStatistics; radiusArcsec: number }) {
  const few = pair.mutualBest < FEW_PAIRS;
  const { medianSepArcsec: median, medianOffsetEastArcsec: east, medianOffsetNorthArcsec: north } = pair;
  return (
    <div className="grid gap-x-8 gap-y-5 sm:grid-cols-2">
      <dl className="grid grid-cols-[auto_1fr] content-start gap-x-4 gap-y-1">
        <Fact name="candidates">{formatCount(pair.candidates)}</Fact>
        <Fact name="mutual best">{formatCount(pair.mutualBest)}</Fact>
        <Fact name="crowded">{formatCount(pair.crowded)}</Fact>
        <Fact name={`of ${pair.a}`}>{formatCount(pair.sourcesAWithCandidate)} sources have a candidate</Fact>
        <Fact name={`of ${pair.b}`}>{formatCount(pair.sourcesBWithCandidate)} sources have a candidate</Fact>
        <Fact name="by chance">
          {formatFixed(pair.chancePairs, pair.chancePairs < 10 ? 1 : 0)} of {formatCount(pair.candidates)}{' '}
          within {formatSepArcsec(radiusArcsec)}
        </Fact>
      </dl>
      <div className="grid content-start gap-3">
        <dl className="grid grid-cols-[auto_1fr] content-start gap-x-4 gap-y-1">
          <Fact name="median separation">{median === null ? '–' : formatSepArcsec(median)}</Fact>
          <Fact name="median offset">
            {east === null || north === null ? (
              '–'
            ) : (
              <>
                E {signedSep(east)}, N {signedSep(north)}
              </>
            )}
          </Fact>
        </dl>
        {median !== null && (
          <Ruler
            label="Median separation"
            marks={[{ sepArcsec: median, label: 'median' }]}
            limitArcsec={radiusArcsec}
          />
        )}
        <p className="text-xs text-muted">
          {pair.b} minus {pair.a}, over the mutual best pairs. Shown, not applied.
        </p>
        {few && (
          <p>
            <FewPairs count={pair.mutualBest} />
          </p>
        )}
      </div>
    </div>
  );
}

function signedSep(arcsec: number): string {
  return `${arcsec > 0 ? '+' : ''}${formatFixed(arcsec, 4)}″`;
}

function Fact({ name, children }: { name: string; children: ReactNode }) {
  return (
    <>
      <dt className="text-muted">{name}</dt>
      <dd>{children}</dd>
    </>
  );
}
