import { createHash } from 'node:crypto';
import { readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { pathToFileURL } from 'node:url';
import { gunzipSync, gzipSync } from 'node:zlib';
import { generateScenario, truthCsv, type ScenarioFile, type TruthRow } from './generate';
import { countPairs, readRows, type PairCounts } from './measure';
import { BANDS, type Band } from './scenario';

/** What the scenario is and what is in it, kept in expected.json. */
export interface Expected {
  sha256: Record<Band, string>;
  rows: Record<Band, number>;
  pairs: Record<string, PairCounts[]>;
}

const PAIRS: readonly { a: Band; b: Band; radiiArcsec: number[] }[] = [
  { a: 'optical', b: 'nir', radiiArcsec: [0.5, 1, 1.5, 2, 3] },
  { a: 'optical', b: 'radio', radiiArcsec: [1, 2, 3, 5, 10] },
  { a: 'optical', b: 'xray', radiiArcsec: [1, 2, 3, 5, 8] },
  { a: 'nir', b: 'radio', radiiArcsec: [1, 2, 3, 5, 10] },
];

const EXPECTED_FILE = path.join(import.meta.dirname, 'expected.json');
const TRUTH_FILE = path.join(import.meta.dirname, 'truth.csv.gz');

/** The numbers that are kept. */
export function readExpected(): Expected {
  return JSON.parse(readFileSync(EXPECTED_FILE, 'utf8')) as Expected;
}

/** The truth table that is kept, as CSV. */
export function readTruthCsv(): string {
  return gunzipSync(readFileSync(TRUTH_FILE)).toString('utf8');
}

/** Measures a scenario afresh. */
export function measureScenario(files: readonly ScenarioFile[], truth: readonly TruthRow[]): Expected {
  const of = (band: Band) => {
    const file = files.find((one) => one.band === band);
    if (file === undefined) throw new Error(`no file of ${band}`);
    return file;
  };
  const each = <T>(value: (file: ScenarioFile) => T) =>
    Object.fromEntries(BANDS.map((band) => [band, value(of(band))])) as Record<Band, T>;
  return {
    sha256: each((file) => createHash('sha256').update(contentOf(file)).digest('hex')),
    rows: each((file) => readRows(file).length),
    pairs: Object.fromEntries(
      PAIRS.map(({ a, b, radiiArcsec }) => [
        `${a}-${b}`,
        radiiArcsec.map((radius) => countPairs(of(a), of(b), truth, radius)),
      ]),
    ),
  };
}

/** The text of a file: packed bytes may differ from one zlib to the next. */
function contentOf(file: ScenarioFile): Buffer {
  return file.name.endsWith('.gz') ? gunzipSync(file.bytes) : file.bytes;
}

/** `npx tsx seed/expected.ts` writes expected.json and truth.csv.gz anew, after a wanted change of the scenario. */
function main(): void {
  const { files, truth } = generateScenario();
  writeFileSync(EXPECTED_FILE, `${JSON.stringify(measureScenario(files, truth), null, 1)}\n`);
  writeFileSync(TRUTH_FILE, gzipSync(truthCsv(truth), { level: 9 }));
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) main();
