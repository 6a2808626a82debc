import type { MappingPreview, UnderstoodRow } from '../../../shared/schemas/mapping';
import { Coordinates } from '../../components/coordinates';
import { Loading } from '../../components/loading';
import { ProblemNotice } from '../../components/problem-notice';
import { plural } from '../../components/quantities';

/** The first rows as they will be understood, and the first that will be set aside. */
export function PreviewTable({
  preview,
  problem,
  retry,
  stale,
}: {
  preview: MappingPreview | null;
  problem: Error | null;
  retry: () => void;
  /** The mapping has changed since; a newer answer is on its way. */
  stale: boolean;
}) {
  if (problem !== null) return <ProblemNotice problem={problem} retry={retry} />;
  if (preview === null) return <Loading rows={5} label="Reading the first rows" />;
  return (
    <div className="grid gap-4" aria-busy={stale || undefined}>
      {preview.rows.length === 0 ? (
        <p className="text-bad">✕ None of the first rows can be read as a source under these columns.</p>
      ) : (
        <UnderstoodRows rows={preview.rows} />
      )}
      {preview.setAside.length > 0 && (
        <div className="grid gap-1">
          <p className="font-medium text-warn">
            {plural(preview.setAside.length, 'row', 'rows')} of those looked at will be set aside:
          </p>
          <ul className="grid gap-1">
            {preview.setAside.map((row) => (
              <li key={row.line}>
                line {row.line}: {row.message}
              </li>
            ))}
          </ul>
        </div>
      )}
    </div>
  );
}

function UnderstoodRows({ rows }: { rows: readonly UnderstoodRow[] }) {
  const bands = rows[0]?.photometry.map((one) => one.band) ?? [];
  const has = (field: (row: UnderstoodRow) => number | null) => rows.some((row) => field(row) !== null);
  const showError = has((row) => row.errMajArcsec);
  const showMotion = has((row) => row.pmRaMasYr);
  const showRedshift = has((row) => row.redshift);
  return (
    <div className="relative overflow-x-auto" tabIndex={0} role="region" aria-label="Rows as they will be understood">
      <table className="w-full border-collapse text-xs">
        <thead>
          <tr className="border-b border-edge text-left text-muted">
            <Head>Line</Head>
            <Head>Key</Head>
            <Head>Names</Head>
            <Head>Position</Head>
            {showError && <Head>Error 1σ ″</Head>}
            {showMotion && <Head>Motion mas/yr</Head>}
            {bands.map((band, i) => (
              <Head key={i}>{band}</Head>
            ))}
            {showRedshift && <Head>z or v</Head>}
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr key={row.line} className="border-b border-rule">
              <Cell>{row.line}</Cell>
              <Cell>{row.key}</Cell>
              <Cell>{row.names.join(' · ')}</Cell>
              <Cell>
                <Coordinates raDeg={row.raDeg} decDeg={row.decDeg} errArcsec={row.errMajArcsec} />
              </Cell>
              {showError && <Cell>{errorText(row)}</Cell>}
              {showMotion && (
                <Cell>
                  {row.pmRaMasYr?.toFixed(1) ?? '—'} {row.pmDecMasYr?.toFixed(1) ?? '—'}
                </Cell>
              )}
              {row.photometry.map((one, i) => (
                <Cell key={i}>{one.value ?? '—'}</Cell>
              ))}
              {showRedshift && <Cell>{row.redshift ?? '—'}</Cell>}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

function errorText({ errMajArcsec, errMinArcsec, errPaDeg }: UnderstoodRow): string {
  if (errMajArcsec === null || errMinArcsec === null) return '—';
  if (errMajArcsec === errMinArcsec) return errMajArcsec.toFixed(3);
  return `${errMajArcsec.toFixed(3)} × ${errMinArcsec.toFixed(3)} at ${(errPaDeg ?? 0).toFixed(0)}°`;
}

function Head({ children }: { children: React.ReactNode }) {
  return <th className="py-1.5 pr-4 font-medium whitespace-nowrap">{children}</th>;
}

function Cell({ children }: { children: React.ReactNode }) {
  return <td className="py-1 pr-4 whitespace-nowrap">{children}</td>;
}
