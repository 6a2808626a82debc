import type { CatalogueSummary } from '../../../shared/schemas/catalogue';
import { formatFixed, formatSepArcsec, formatShare } from '../../components/quantities';
import { Ruler } from '../../components/ruler';
import { Stamp } from '../../components/stamp';
import { StatusChip } from '../../components/status-chip';
import { epochGaps, radiusShares } from '../../components/radius-advice';
import { epochText } from '../../components/run-words';
import { useCatalogueDetails } from './use-ready-catalogues';

const RULER_END_ARCSEC = 600;

/** The radius on the ruler beside the errors of the chosen catalogues, and what it means for true pairs. */
export function RadiusRuler({
  group,
  chosen,
  ready,
  radiusArcsec,
  onRadiusChange,
}: {
  group: string;
  chosen: readonly string[];
  ready: readonly CatalogueSummary[];
  /** Null or NaN while nothing readable is typed. */
  radiusArcsec: number | null | undefined;
  onRadiusChange: (radiusArcsec: number) => void;
}) {
  const details = useCatalogueDetails(group, chosen);
  const known = chosen.flatMap((label) => ready.find((one) => one.label === label) ?? []);
  const radius =
    typeof radiusArcsec === 'number' && Number.isFinite(radiusArcsec) && radiusArcsec > 0
      ? radiusArcsec
      : null;
  const marks = details.flatMap(({ medianErrArcsec, label, ordinal }) =>
    medianErrArcsec === null || medianErrArcsec <= 0
      ? []
      : [{ sepArcsec: medianErrArcsec, label: `median error of ${label}`, ordinal }],
  );
  return (
    <div className="grid gap-3">
      <Ruler
        label="Radius and median errors"
        marks={marks}
        limitArcsec={radius}
        onLimitChange={onRadiusChange}
      />
      {radius !== null && radius > RULER_END_ARCSEC && (
        <p className="text-xs text-muted">The radius lies beyond the end of the ruler.</p>
      )}
      {details.length > 0 && (
        <ul className="flex flex-wrap gap-x-6 gap-y-1 text-xs" aria-label="Median errors, one sigma per axis">
          {details.map((catalogue) => (
            <li key={catalogue.label} className="inline-flex items-center gap-2">
              <Stamp catalogue={catalogue} size={18} withLabel />
              <span className="text-muted">
                {catalogue.medianErrArcsec === null
                  ? 'states no error'
                  : `median error ${formatSepArcsec(catalogue.medianErrArcsec)}`}
              </span>
            </li>
          ))}
        </ul>
      )}
      {radius !== null &&
        radiusShares(details, radius).map(({ a, b, sigmaArcsec, share }) => (
          <p key={`${a} ${b}`}>
            {a} and {b}: the radius is {formatFixed(radius / sigmaArcsec, 1)} times their combined median
            error ({formatSepArcsec(sigmaArcsec)}) and holds{' '}
            {share > 0.9999 ? 'more than 99.99\u2009%' : formatShare(share, 2)} of the true pairs, if the
            errors are as stated and nothing is shifted.
          </p>
        ))}
      <EpochNotes catalogues={known} />
    </div>
  );
}

function EpochNotes({ catalogues }: { catalogues: readonly CatalogueSummary[] }) {
  const gaps = epochGaps(catalogues);
  const unknown = catalogues.filter(({ epochYear }) => epochYear === null);
  if (gaps.length === 0 && unknown.length === 0) return null;
  return (
    <ul className="grid gap-1.5">
      {gaps.map(({ a, b, years }) => (
        <li key={`${a.label} ${b.label}`} className="flex flex-wrap items-baseline gap-2">
          <StatusChip tone="warn" icon="!">
            epochs differ
          </StatusChip>
          <span>
            {a.label} {epochText(a.epochYear)}, {b.label} {epochText(b.epochYear)}: {formatFixed(years, 1)}{' '}
            years apart. Proper motions are not applied: 100 mas a year make{' '}
            {`${formatFixed(years * 0.1, 2)}″`}.
          </span>
        </li>
      ))}
      {unknown.length > 0 && (
        <li className="flex flex-wrap items-baseline gap-2">
          <StatusChip icon="?">epoch not stated</StatusChip>
          <span>
            {unknown.map(({ label }) => label).join(', ')}: how far sources have moved cannot be said.
          </span>
        </li>
      )}
    </ul>
  );
}
