import { mkdirSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { pathToFileURL } from 'node:url';
import { gzipSync } from 'node:zlib';
import { rowsOf, type Row } from './catalogue-rows';
import { detectAll, type Detection } from './detections';
import { BANDS, CATALOGUES, type Band } from './scenario';

export interface ScenarioFile {
  band: Band;
  name: string;
  bytes: Buffer;
}

/** One line of the truth table: a thing of the sky and the keys of its rows. */
export interface TruthRow {
  id: string;
  kind: string;
  blend: number | null;
  keys: Record<Band, string[]>;
}

const HEADERS: Record<Band, string[]> = {
  optical: ['id', 'name', 'ra', 'dec', 'err', 'pmra', 'pmdec', 'gmag', 'rmag', 'imag', 'shape'],
  nir: ['name', 'RA (J2000)', 'Dec (J2000)', 'r90', 'Jmag', 'Kmag'],
  radio: ['name', 'RA', 'Dec', 'err_maj', 'err_min', 'err_pa', 'flux_mJy', 'flux_err', 'shape'],
  xray: ['id', 'names', 'position', 'r95_arcsec', 'flux_cgs'],
};
const DELIMITERS: Record<Band, string> = { optical: ',', nir: ';', radio: '\t', xray: ',' };
const COMMENTS: Record<Band, string> = {
  optical: '',
  nir: '',
  radio: '',
  xray: '# Flint X-ray list of the Lantern Field (invented)\n# position: RA (h m s) and Dec (d m s), J2000; r95: radius that holds 95 %\n',
};

/** The four files of the scenario and the truth behind them; the same bytes on every machine. */
export function generateScenario(): { files: ScenarioFile[]; truth: TruthRow[] } {
  const detections = detectAll();
  const truth = new Map<string, TruthRow>();
  const files = BANDS.map((band) => {
    const rows = rowsOf(band, detections[band]);
    noteTruth(truth, band, detections[band], rows);
    return { band, name: CATALOGUES[band].fileName, bytes: bytesOf(band, rows) };
  });
  return { files, truth: [...truth.values()].sort((a, b) => (a.id < b.id ? -1 : 1)) };
}

function noteTruth(truth: Map<string, TruthRow>, band: Band, detections: readonly Detection[], rows: readonly Row[]): void {
  const good = rows.filter((row) => row.key !== null);
  detections.forEach((detection, i) => {
    const key = good[i]?.key ?? '';
    for (const thing of detection.things) {
      const known = truth.get(thing.id) ?? {
        id: thing.id,
        kind: thing.kind,
        blend: thing.blend,
        keys: { optical: [], nir: [], radio: [], xray: [] },
      };
      known.keys[band].push(key);
      truth.set(thing.id, known);
    }
  });
}

function bytesOf(band: Band, rows: readonly Row[]): Buffer {
  const lines = [HEADERS[band], ...rows.map((row) => row.cells)].map((cells) => cells.join(DELIMITERS[band]));
  const text = Buffer.from(`${COMMENTS[band]}${lines.join('\n')}\n`);
  return CATALOGUES[band].fileName.endsWith('.gz') ? gzipSync(text, { level: 9 }) : text;
}

const TRUTH_HEADER = ['id', 'kind', 'blend', ...BANDS];

/** The truth as CSV; several keys of one band are joined by ';'. */
export function truthCsv(truth: readonly TruthRow[]): string {
  const lines = truth.map((row) =>
    [row.id, row.kind, row.blend ?? '', ...BANDS.map((band) => row.keys[band].join(';'))].join(','),
  );
  return `${[TRUTH_HEADER.join(','), ...lines].join('\n')}\n`;
}

/** Reads the truth table back. */
export function parseTruth(csv: string): TruthRow[] {
  return csv
    .trim()
    .split('\n')
    .slice(1)
    .map((line) => {
      const [id = '', kind = '', blend = '', ...keys] = line.split(',');
      const of = (band: Band) => (keys[BANDS.indexOf(band)] ?? '').split(';').filter((key) => key !== '');
      return {
        id,
        kind,
        blend: blend === '' ? null : Number(blend),
        keys: { optical: of('optical'), nir: of('nir'), radio: of('radio'), xray: of('xray') },
      };
    });
}

/** `npx tsx seed/generate.ts FOLDER` writes the files there. */
function main(folder: string | undefined): void {
  if (folder === undefined) {
    process.stderr.write('Name the folder to write to: npx tsx seed/generate.ts FOLDER\n');
    process.exit(2);
  }
  mkdirSync(folder, { recursive: true });
  const { files, truth } = generateScenario();
  for (const file of files) writeFileSync(path.join(folder, file.name), file.bytes);
  writeFileSync(path.join(folder, 'truth.csv.gz'), gzipSync(truthCsv(truth), { level: 9 }));
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) main(process.argv[2]);
