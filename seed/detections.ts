import { inventSky, type Thing } from './sky';
import { BANDS, EPOCHS, FIELD, NIR_SHIFT, SEED, type Band } from './scenario';
import { randomFrom, type Random } from './random';

/** What an instrument saw: measured place as tangent-plane offsets, and of which things it is the light. */
export interface Detection {
  things: Thing[];
  eastArcsec: number;
  northArcsec: number;
  /** One sigma per axis; an ellipse for the radio. */
  majArcsec: number;
  minArcsec: number;
  paDeg: number;
  /** Component of a double radio source. */
  component: 'A' | 'B' | null;
  signalToNoise: number;
}

const SEEN: Record<Band, Record<Thing['kind'], number>> = {
  optical: { galaxy: 0.84, star: 0.97, agn: 0.9 },
  nir: { galaxy: 0.51, star: 0.74, agn: 0.86 },
  radio: { galaxy: 0.1, star: 0.002, agn: 0.72 },
  xray: { galaxy: 0.075, star: 0.16, agn: 0.88 },
};
const SPURIOUS: Record<Band, number> = { optical: 150, nir: 260, radio: 180, xray: 240 };
/** Instruments that cannot tell the two things of a blend apart. */
const BLENDING: readonly Band[] = ['nir', 'radio', 'xray'];
const DOUBLE_SHARE = 0.09;
const BEAM_ARCSEC = 15;
const RADIUS_ARCSEC = FIELD.radiusDeg * 3600;
const RADIANS = Math.PI / 180;

/** The detections of every band, sorted by declination as a catalogue would be. */
export function detectAll(): Record<Band, Detection[]> {
  const sky = inventSky();
  const seen = (band: Band) => detect(band, sky, randomFrom(SEED + 17 * (BANDS.indexOf(band) + 1)));
  return { optical: seen('optical'), nir: seen('nir'), radio: seen('radio'), xray: seen('xray') };
}

function detect(band: Band, sky: readonly Thing[], random: Random): Detection[] {
  const list: Detection[] = [];
  for (const things of lights(band, sky)) {
    const [first] = things;
    if (first === undefined || !random.chance(SEEN[band][first.kind])) continue;
    const at = placeOf(things, EPOCHS[band]);
    if (band === 'radio' && first.kind === 'agn' && random.chance(DOUBLE_SHARE)) list.push(...lobes(random, things, at));
    else list.push(measured(band, random, things, at, null));
  }
  for (let i = 0; i < SPURIOUS[band]; i += 1) {
    const radius = RADIUS_ARCSEC * Math.sqrt(random.next());
    const angle = random.between(0, 2 * Math.PI);
    const at = { eastArcsec: radius * Math.sin(angle), northArcsec: radius * Math.cos(angle) };
    list.push(measured(band, random, [], at, null));
  }
  return list.sort((a, b) => a.northArcsec - b.northArcsec || a.eastArcsec - b.eastArcsec);
}

/** Single things, and for the wider instruments the things of a blend together. */
function lights(band: Band, sky: readonly Thing[]): Thing[][] {
  if (!BLENDING.includes(band)) return sky.map((thing) => [thing]);
  const blends = new Map<number, Thing[]>();
  const groups: Thing[][] = [];
  for (const thing of sky) {
    const known = thing.blend === null ? undefined : blends.get(thing.blend);
    if (known !== undefined) {
      known.push(thing);
      continue;
    }
    const group = [thing];
    groups.push(group);
    if (thing.blend !== null) blends.set(thing.blend, group);
  }
  return groups;
}

type Place = Pick<Detection, 'eastArcsec' | 'northArcsec'>;

/** Where the light of the things is at an epoch: the mean place, weighted by brightness. */
function placeOf(things: readonly Thing[], epoch: number): Place {
  const years = epoch - EPOCHS.optical;
  let weight = 0;
  let east = 0;
  let north = 0;
  for (const thing of things) {
    const light = 10 ** (-0.4 * thing.rMag);
    weight += light;
    east += light * (thing.eastArcsec + (thing.pmEastMasYr * years) / 1000);
    north += light * (thing.northArcsec + (thing.pmNorthMasYr * years) / 1000);
  }
  return { eastArcsec: east / weight, northArcsec: north / weight };
}

function lobes(random: Random, things: Thing[], at: Place): Detection[] {
  const angle = random.between(0, 2 * Math.PI);
  return (['A', 'B'] as const).map((component) => {
    const side = component === 'A' ? 1 : -1;
    const half = random.between(7, 18);
    const place = {
      eastArcsec: at.eastArcsec + side * half * Math.sin(angle),
      northArcsec: at.northArcsec + side * half * Math.cos(angle),
    };
    return measured('radio', random, things, place, component);
  });
}

function measured(band: Band, random: Random, things: Thing[], at: Place, component: 'A' | 'B' | null): Detection {
  const faintness = things[0] === undefined ? 22.5 : Math.min(...things.map((thing) => thing.rMag));
  const signalToNoise = 4.5 / Math.max(0.02, random.next()) ** 0.8;
  const error = errorOf(band, random, at, faintness, signalToNoise);
  const along = random.normal() * error.majArcsec;
  const across = random.normal() * error.minArcsec;
  const pa = error.paDeg * RADIANS;
  const seenAt = band === 'nir' ? throughNirFrame(at) : at;
  return {
    things,
    eastArcsec: seenAt.eastArcsec + along * Math.sin(pa) + across * Math.cos(pa),
    northArcsec: seenAt.northArcsec + along * Math.cos(pa) - across * Math.sin(pa),
    ...error,
    component,
    signalToNoise,
  };
}

/** The near-infrared list's own frame: shifted, and turned about the field centre. */
function throughNirFrame(at: Place): Place {
  const turn = NIR_SHIFT.rotationDeg * RADIANS;
  return {
    eastArcsec: at.eastArcsec + NIR_SHIFT.eastArcsec + turn * at.northArcsec,
    northArcsec: at.northArcsec + NIR_SHIFT.northArcsec - turn * at.eastArcsec,
  };
}

function errorOf(band: Band, random: Random, at: Place, mag: number, signalToNoise: number) {
  if (band === 'optical') return circle(0.05 + 0.22 * 10 ** (0.18 * (mag - 23)));
  if (band === 'nir') return circle(0.08 + 0.26 * 10 ** (0.16 * (mag - 23)));
  if (band === 'xray') return circle(0.45 + 1.5 * (Math.hypot(at.eastArcsec, at.northArcsec) / RADIUS_ARCSEC) ** 2);
  const major = Math.max(0.25, BEAM_ARCSEC / (2 * signalToNoise));
  return { majArcsec: major, minArcsec: major * random.between(0.6, 1), paDeg: random.between(0, 180) };
}

function circle(sigmaArcsec: number) {
  return { majArcsec: sigmaArcsec, minArcsec: sigmaArcsec, paDeg: 0 };
}
