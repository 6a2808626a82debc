import { formatDec, formatRa } from '../shared/astro/angles';
import { skyFromOffset } from './field';
import type { Detection } from './detections';
import { BAD_ROWS, type Band } from './scenario';
import { randomFrom, type Random } from './random';

/** One line of a file, and the own key of the row (null: a row that cannot be a source). */
export interface Row {
  key: string | null;
  cells: string[];
}

const ROW_SEED = 90_210;
const R95_OF_SIGMA = 2.4477;
const R90_OF_SIGMA = 2.146;
const OLD_NAME_SHARE = 0.4;

/** The rows of a band's file in its own style, with the rows that cannot be sources strewn in. */
export function rowsOf(band: Band, detections: readonly Detection[]): Row[] {
  const random = randomFrom(ROW_SEED + band.length);
  const used = new Set<string>();
  const rows = detections.map((detection, i) => WRITERS[band](detection, i + 1, random, used));
  return withBadRows(band, rows);
}

type Writer = (detection: Detection, serial: number, random: Random, used: Set<string>) => Row;

const WRITERS: Record<Band, Writer> = { optical: opticalRow, nir: nirRow, radio: radioRow, xray: xrayRow };

function opticalRow(detection: Detection, serial: number, random: Random): Row {
  const { raDeg, decDeg } = skyFromOffset(detection);
  const thing = detection.things[0];
  const key = `W${200_000 + serial * 3}`;
  const r = (thing?.rMag ?? random.between(21, 23.3)) + 0.03 * random.normal();
  const colour = thing?.kind === 'agn' ? 0.3 : thing?.kind === 'star' ? 0.7 : 1.0;
  const g = r + colour + 0.15 * random.normal();
  const i = r - 0.5 * colour + 0.1 * random.normal();
  const moves = thing?.kind === 'star' && thing.rMag < 20.5;
  const motion = (value: number) => (moves ? (value + random.normal()).toFixed(2) : '');
  return {
    key,
    cells: [
      key,
      `WICK ${String(serial).padStart(6, '0')}`,
      raDeg.toFixed(7),
      decDeg.toFixed(7),
      detection.majArcsec.toFixed(3),
      motion(thing?.pmEastMasYr ?? 0),
      motion(thing?.pmNorthMasYr ?? 0),
      g.toFixed(3),
      r.toFixed(3),
      i.toFixed(3),
      thing?.kind === 'galaxy' ? 'extended' : 'point',
    ],
  };
}

function nirRow(detection: Detection, _serial: number, random: Random, used: Set<string>): Row {
  const { raDeg, decDeg } = skyFromOffset(detection);
  const name = uniqueName(`COAL J${truncatedName(raDeg, decDeg)}`, used);
  const j = (detection.things[0]?.rMag ?? random.between(20, 22.5)) - 1.2 + 0.25 * random.normal();
  return {
    key: name,
    cells: [
      name,
      spaced(formatRa(raDeg, 3)),
      spaced(formatDec(decDeg, 2)),
      (detection.majArcsec * R90_OF_SIGMA).toFixed(2),
      j.toFixed(2),
      (j - 0.8 + 0.2 * random.normal()).toFixed(2),
    ],
  };
}

function radioRow(detection: Detection, serial: number, random: Random): Row {
  const { raDeg, decDeg } = skyFromOffset(detection);
  const key = `HUM ${String(serial).padStart(4, '0')}${detection.component ?? ''}`;
  const [h, m, s] = formatRa(raDeg, 3).split(':');
  const [d, dm, ds] = formatDec(decDeg, 2).split(':');
  const flux = 0.11 * detection.signalToNoise;
  return {
    key,
    cells: [
      key,
      `${h}h${m}m${s}s`,
      `${d}d${dm}m${ds}s`,
      detection.majArcsec.toFixed(2),
      detection.minArcsec.toFixed(2),
      detection.paDeg.toFixed(1),
      flux.toFixed(3),
      (flux / detection.signalToNoise).toFixed(3),
      random.chance(0.2) ? 'resolved' : 'unresolved',
    ],
  };
}

function xrayRow(detection: Detection, serial: number, random: Random): Row {
  const { raDeg, decDeg } = skyFromOffset(detection);
  const key = `F${serial}`;
  const name = `FLINT ${String(serial).padStart(4, '0')}`;
  const flux = 1e-15 * detection.signalToNoise * random.between(0.8, 1.2);
  return {
    key,
    cells: [
      key,
      random.chance(OLD_NAME_SHARE) ? `${name};OLDFLINT ${serial + 40}` : name,
      `${spaced(formatRa(raDeg, 2))} ${spaced(formatDec(decDeg, 1))}`,
      (detection.majArcsec * R95_OF_SIGMA).toFixed(2),
      flux.toExponential(2),
    ],
  };
}

const spaced = (sexagesimal: string) => sexagesimal.replaceAll(':', ' ');

/** '141336.1-371200': digits cut off, not rounded, as the IAU asks of names made of coordinates. */
function truncatedName(raDeg: number, decDeg: number): string {
  const ra = formatRa(raDeg, 4).replaceAll(':', '');
  const dec = formatDec(decDeg, 4).replaceAll(':', '');
  return `${ra.slice(0, 8)}${dec.slice(0, 7)}`;
}

function uniqueName(name: string, used: Set<string>): string {
  let unique = name;
  for (const letter of ['', 'b', 'c', 'd']) {
    unique = `${name}${letter}`;
    if (!used.has(unique)) break;
  }
  used.add(unique);
  return unique;
}

/** Rows with a slip each: no declination, right ascension out of range, a key that was there before. */
function withBadRows(band: Band, rows: readonly Row[]): Row[] {
  const all = [...rows];
  const positionCell = { optical: 2, nir: 1, radio: 1, xray: 2 }[band];
  for (let i = 0; i < BAD_ROWS[band]; i += 1) {
    const at = Math.floor((all.length * (i + 1)) / (BAD_ROWS[band] + 1));
    const model = all[at];
    if (model === undefined || model.key === null) continue;
    const cells = [...model.cells];
    const slip = i % 3;
    if (slip < 2) cells[0] = `${model.cells[0]}x`;
    if (slip === 0) cells[positionCell === 2 && band === 'xray' ? 2 : positionCell + 1] = '';
    if (slip === 1) cells[positionCell] = band === 'optical' ? '413.5' : '27 14 00.0 -37 00 00';
    all.splice(at + 1, 0, { key: null, cells });
  }
  return all;
}
