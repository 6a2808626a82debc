import { formatDec, formatRa } from '../../shared/astro/angles';
import { CopyButton } from './copy-button';
import { formatFixed } from './quantities';
import { secondsDigits } from './seconds-digits';

/**
 * A position in columns. Sexagesimal with as many decimals as the error (arcsec) deserves, or degrees;
 * `copy` adds a button that copies both coordinates in degrees to nine decimals.
 */
export function Coordinates({
  raDeg,
  decDeg,
  errArcsec = null,
  notation = 'sexagesimal',
  copy = false,
}: {
  raDeg: number;
  decDeg: number;
  errArcsec?: number | null;
  notation?: 'sexagesimal' | 'degrees';
  copy?: boolean;
}) {
  const digits = secondsDigits(errArcsec);
  const shown =
    notation === 'degrees'
      ? [formatFixed(raDeg, 6).padStart(10, '\u2007'), signed(decDeg)]
      : [formatRa(raDeg, digits + 1), formatDec(decDeg, digits).replace('-', '−')];
  return (
    <span className="inline-flex flex-wrap items-center gap-x-3 gap-y-1">
      <span className="whitespace-nowrap">
        <span className="sr-only">RA</span> {shown[0]}
      </span>
      <span className="whitespace-nowrap">
        <span className="sr-only">Dec</span> {shown[1]}
      </span>
      {copy && (
        <CopyButton
          text={`${raDeg.toFixed(9)} ${decDeg.toFixed(9)}`}
          ariaLabel="Copy the position in degrees"
        />
      )}
    </span>
  );
}

function signed(decDeg: number): string {
  const text = formatFixed(Math.abs(decDeg), 6).padStart(9, '0');
  return `${decDeg < 0 ? '−' : '+'}${text}`;
}
