/**
 * Decimals for the seconds of a declination with this one-sigma error (arcsec): one more than the error's first
 * digit, 1 to 4; 2 when the error is not known. Right ascension takes one more, because 1 s of time is 15″.
 */
export function secondsDigits(errArcsec: number | null): number {
  if (errArcsec === null || !(errArcsec > 0)) return 2;
  return Math.min(4, Math.max(1, 1 - Math.floor(Math.log10(errArcsec))));
}
