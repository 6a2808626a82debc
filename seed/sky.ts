import { COUNTS, FIELD, SEED } from './scenario';
import { randomFrom, type Random } from './random';

export type Kind = 'galaxy' | 'star' | 'agn';

/** A thing that really is in the invented sky: place at 2016.0 as tangent-plane offsets from the field centre. */
export interface Thing {
  id: string;
  kind: Kind;
  eastArcsec: number;
  northArcsec: number;
  pmEastMasYr: number;
  pmNorthMasYr: number;
  rMag: number;
  /** Things of one blend bear the same number. */
  blend: number | null;
}

const RADIUS_ARCSEC = FIELD.radiusDeg * 3600;
const CLUSTER_SIGMA_ARCSEC = 75;
const BRIGHTEST_MAG = 14;
const FAINTEST_MAG = 23.4;

/** All things of the invented sky, in a fixed order. */
export function inventSky(): Thing[] {
  const random = randomFrom(SEED);
  const things: Thing[] = [];
  const add = (kind: Kind, place: Place, more: Partial<Thing> = {}) =>
    things.push({
      id: `T${String(things.length + 1).padStart(5, '0')}`,
      kind,
      ...place,
      pmEastMasYr: 0,
      pmNorthMasYr: 0,
      rMag: magnitude(random, kind),
      blend: null,
      ...more,
    });
  const clusters = Array.from({ length: COUNTS.clusters }, () => inDisc(random));
  for (let i = 0; i < COUNTS.galaxies; i += 1) {
    const home = random.chance(COUNTS.clusteredShare) ? clusters[Math.floor(random.next() * clusters.length)] : undefined;
    add('galaxy', home === undefined ? inDisc(random) : nearby(random, home));
  }
  for (let blend = 0; blend < COUNTS.blends; blend += 1) {
    const first = inDisc(random);
    const separation = random.between(0.9, 2.4);
    const angle = random.between(0, 2 * Math.PI);
    const second = {
      eastArcsec: first.eastArcsec + separation * Math.sin(angle),
      northArcsec: first.northArcsec + separation * Math.cos(angle),
    };
    for (const place of [first, second]) add('galaxy', place, { blend, rMag: random.between(17, 20.5) });
  }
  for (let i = 0; i < COUNTS.stars; i += 1) add('star', inDisc(random), motion(random, i < COUNTS.fastStars));
  for (let i = 0; i < COUNTS.agn; i += 1) add('agn', inDisc(random));
  return things;
}

type Place = Pick<Thing, 'eastArcsec' | 'northArcsec'>;

function inDisc(random: Random): Place {
  const radius = RADIUS_ARCSEC * Math.sqrt(random.next());
  const angle = random.between(0, 2 * Math.PI);
  return { eastArcsec: radius * Math.sin(angle), northArcsec: radius * Math.cos(angle) };
}

function nearby(random: Random, home: Place): Place {
  const place = {
    eastArcsec: home.eastArcsec + random.normal() * CLUSTER_SIGMA_ARCSEC,
    northArcsec: home.northArcsec + random.normal() * CLUSTER_SIGMA_ARCSEC,
  };
  return Math.hypot(place.eastArcsec, place.northArcsec) <= RADIUS_ARCSEC ? place : nearby(random, home);
}

/** More faint things than bright ones: counts rise by about 0.3 dex a magnitude. */
function magnitude(random: Random, kind: Kind): number {
  const span = FAINTEST_MAG - BRIGHTEST_MAG;
  const slope = kind === 'star' ? 0.12 : 0.3;
  const top = 10 ** (slope * span);
  return BRIGHTEST_MAG + Math.log10(1 + random.next() * (top - 1)) / slope;
}

function motion(random: Random, fast: boolean): Partial<Thing> {
  const total = fast ? random.between(200, 1500) : Math.abs(random.normal()) * 12;
  const angle = random.between(0, 2 * Math.PI);
  return {
    pmEastMasYr: total * Math.sin(angle),
    pmNorthMasYr: total * Math.cos(angle),
    ...(fast ? { rMag: random.between(14, 19) } : {}),
  };
}
