import { describe, expect, it } from 'vitest';
import { separationArcsec } from '../shared/astro/sphere';
import { columnMapping } from '../shared/schemas/mapping';
import { measureScenario, readExpected, readTruthCsv } from './expected';
import { generateScenario, parseTruth, truthCsv } from './generate';
import { readRows } from './measure';
import { BAD_ROWS, BANDS, CATALOGUES, COUNTS, EPOCHS, NIR_SHIFT } from './scenario';
import { inventSky } from './sky';

const { files, truth } = generateScenario();
const fileOf = (band: (typeof BANDS)[number]) => {
  const file = files.find((one) => one.band === band);
  if (file === undefined) throw new Error(band);
  return file;
};

describe('the demo scenario', () => {
  it('comes out the same as the numbers and the truth table that are kept', () => {
    expect(measureScenario(files, truth)).toEqual(readExpected());
    expect(truthCsv(truth)).toBe(readTruthCsv());
    expect(truthCsv(parseTruth(readTruthCsv()))).toBe(readTruthCsv());
  });

  it('has between 2,500 and 20,000 sources a catalogue, and the stated rows that cannot be sources', () => {
    for (const band of BANDS) {
      const usable = readRows(fileOf(band)).length;
      expect(usable).toBeGreaterThan(2500);
      expect(usable).toBeLessThan(20_000);
      const detected = truth.reduce((sum, row) => sum + row.keys[band].length, 0);
      expect(detected).toBeGreaterThan(usable * 0.85);
    }
    expect(Object.values(BAD_ROWS).every((count) => count > 0)).toBe(true);
  });

  it('gives back the shift of the near-infrared frame', () => {
    const optical = new Map(readRows(fileOf('optical')).map((row) => [row.key, row]));
    const nir = new Map(readRows(fileOf('nir')).map((row) => [row.key, row]));
    const east: number[] = [];
    const north: number[] = [];
    for (const row of truth.filter((one) => one.kind === 'galaxy' && one.blend === null)) {
      const a = optical.get(row.keys.optical[0] ?? '');
      const b = nir.get(row.keys.nir[0] ?? '');
      if (a === undefined || b === undefined) continue;
      east.push(((b.raRad - a.raRad) * Math.cos(a.decRad) * 180 * 3600) / Math.PI);
      north.push(((b.decRad - a.decRad) * 180 * 3600) / Math.PI);
    }
    const mean = (list: number[]) => list.reduce((sum, value) => sum + value, 0) / list.length;
    expect(east.length).toBeGreaterThan(3000);
    expect(mean(east)).toBeCloseTo(NIR_SHIFT.eastArcsec, 1);
    expect(mean(north)).toBeCloseTo(NIR_SHIFT.northArcsec, 1);
  });

  it('has stars that move by more than a second between two epochs, and blends', () => {
    const years = EPOCHS.optical - EPOCHS.xray;
    const moved = inventSky().filter((thing) => (Math.hypot(thing.pmEastMasYr, thing.pmNorthMasYr) * years) / 1000 > 1);
    expect(moved.length).toBeGreaterThanOrEqual(COUNTS.fastStars);
    expect(new Set(truth.filter((row) => row.blend !== null).map((row) => row.blend)).size).toBeGreaterThan(50);
  });

  it('keeps everything inside the field', () => {
    for (const row of readRows(fileOf('xray'))) {
      const sep = separationArcsec((row.raRad * 180) / Math.PI, (row.decRad * 180) / Math.PI, 213.4, -37.2);
      expect(sep).toBeLessThan(0.72 * 3600);
    }
  });

  it('describes each file with a mapping of the contract', () => {
    for (const band of BANDS) expect(columnMapping.safeParse(CATALOGUES[band].mapping).success).toBe(true);
  });
});
