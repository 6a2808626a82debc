import { shareWithinRadius } from '../../shared/astro/errors';

/** Epochs further apart than this (years) are warned of: motions are not applied. */
export const EPOCH_GAP_YEARS = 1;

export interface ErrorKnown {
  label: string;
  medianErrArcsec: number | null;
}

/** What a radius means for two catalogues: sigma (arcsec) is the median error of a difference, per axis. */
export interface RadiusShare {
  a: string;
  b: string;
  sigmaArcsec: number;
  /** Share of true pairs inside the radius, if the errors are as stated and nothing is shifted. */
  share: number;
}

/**
 * For each two of the catalogues that state errors: the combined error and the share of true pairs inside a radius
 * (arcsec). Circular normal errors (Rayleigh); one median error stands for the whole catalogue.
 */
export function radiusShares(catalogues: readonly ErrorKnown[], radiusArcsec: number): RadiusShare[] {
  const shares: RadiusShare[] = [];
  catalogues.forEach((a, i) => {
    for (const b of catalogues.slice(i + 1)) {
      if (a.medianErrArcsec === null || b.medianErrArcsec === null) continue;
      const sigmaArcsec = Math.hypot(a.medianErrArcsec, b.medianErrArcsec);
      if (!(sigmaArcsec > 0)) continue;
      shares.push({
        a: a.label,
        b: b.label,
        sigmaArcsec,
        share: shareWithinRadius(radiusArcsec, sigmaArcsec),
      });
    }
  });
  return shares;
}

export interface EpochKnown {
  label: string;
  epochYear: number | null;
}

export interface EpochGap {
  a: EpochKnown;
  b: EpochKnown;
  years: number;
}

/** Pairs of catalogues whose epochs are more than a year apart. */
export function epochGaps(catalogues: readonly EpochKnown[]): EpochGap[] {
  return catalogues.flatMap((a, i) =>
    catalogues.slice(i + 1).flatMap((b) => {
      if (a.epochYear === null || b.epochYear === null) return [];
      const years = Math.abs(b.epochYear - a.epochYear);
      return years > EPOCH_GAP_YEARS ? [{ a, b, years }] : [];
    }),
  );
}

/** Moves one item of a list by one place; at an end the list stays as it is. */
export function movedItem<T>(items: readonly T[], index: number, by: -1 | 1): T[] {
  const after = [...items];
  const [item] = after.splice(index, 1);
  const to = index + by;
  if (item === undefined || to < 0 || to > after.length) return [...items];
  after.splice(to, 0, item);
  return after;
}
