import { readFileSync } from 'node:fs';
import path from 'node:path';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { openBrowserWorld, type BrowserWorld } from '../support/browser-world';

const SAMPLES = path.join(import.meta.dirname, '..', 'outside', 'data', 'deepsky-south');
/** Counted with astropy and SciPy, see the README beside the data. */
const EXPECTED = JSON.parse(readFileSync(path.join(SAMPLES, 'expected.json'), 'utf8')) as {
  alphaRows: number;
  betaRows: number;
  byRadiusArcsec: Record<string, { pairs: number; mutualNearest: number }>;
};
const RADIUS_ARCSEC = '5';
const POLL_MS = 30_000;

const number = (value: number) => value.toLocaleString('en-US');

/** The whole job as a person does it, on two real lists. */
describe('from two tables to a merged one', () => {
  let bw: BrowserWorld;
  let page: Page;
  const at = (below: string) => `${bw.url}/g/${bw.world.group}/${below}`;
  beforeAll(async () => {
    bw = await openBrowserWorld();
    page = await bw.open('nobody');
  });
  afterAll(() => bw.close());

  it('signs in, and says what was wrong with a wrong password', async () => {
    await page.goto(`${bw.url}/`);
    await page.getByLabel('E-mail').fill('curator@example.org');
    await page.getByLabel('Password').fill('not the password');
    await page.getByRole('button', { name: 'Sign in' }).click();
    await page.getByText('No account has this e-mail and password').waitFor();
    await page.getByLabel('Password').fill('a password for tests');
    await page.getByRole('button', { name: 'Sign in' }).click();
    await page.getByRole('heading', { name: 'Today', level: 1 }).waitFor();
    await page.getByText('Three steps to a merged table').waitFor();
  });

  async function addCatalogue(file: string, label: string, title: string, rows: number): Promise<void> {
    await page.goto(at('catalogues/new'));
    await page.locator('input[type=file]').setInputFiles(path.join(SAMPLES, file));
    // The first rows as they will be understood stand there before anything is imported.
    await page.getByRole('region', { name: 'Rows as they will be understood' }).waitFor();
    await page.getByLabel('Label', { exact: true }).fill(label);
    await page.getByLabel('Title').fill(title);
    await page.getByRole('button', { name: 'Import' }).click();
    await page.getByRole('tab', { name: new RegExp(`Sources ${number(rows)}`) }).waitFor();
  }

  it('imports two catalogues with the columns as suggested', async () => {
    await addCatalogue('alpha.csv.gz', 'ALPHA', 'Deep-sky list alpha', EXPECTED.alphaRows);
    await addCatalogue('beta.tsv.gz', 'BETA', 'Deep-sky list beta', EXPECTED.betaRows);
    await page.goto(at('catalogues'));
    await page.getByRole('link', { name: 'ALPHA' }).waitFor();
  });

  it('cross-matches them and finds the pairs that the reference found', async () => {
    await page.goto(at('cross-match/new'));
    await page.getByRole('button', { name: 'Choose ALPHA' }).click();
    await page.getByRole('button', { name: 'Choose BETA' }).click();
    await page.getByLabel('Largest separation').fill(RADIUS_ARCSEC);
    await page.getByRole('button', { name: 'Start the cross-match' }).click();
    const expected = EXPECTED.byRadiusArcsec[RADIUS_ARCSEC];
    await page.getByRole('tab', { name: new RegExp(`Candidates ${number(expected?.pairs ?? 0)}`) }).waitFor();
    const facts = await page.locator('main').innerText();
    expect(facts).toMatch(new RegExp(`mutual best\\s+${number(expected?.mutualNearest ?? 0)}`));
  });

  it('applies a policy to the clear cases after saying how many there are', async () => {
    await page.getByRole('button', { name: 'Apply' }).click();
    await page.getByRole('dialog').getByRole('button', { name: /^Give \d/ }).click();
    await page.getByRole('button', { name: 'Take back' }).waitFor();
  });

  it('decides a doubtful pair at the keyboard, and undoes it', async () => {
    await page.goto(at('review/1'));
    await page.getByRole('heading', { name: /Candidate \d+/ }).waitFor();
    await page.getByRole('heading', { name: 'The two sources' }).waitFor();
    const candidate = async () => /\d+/.exec(await page.getByRole('heading', { level: 1 }).innerText())?.[0] ?? '';
    const before = await candidate();
    await expect.poll(() => page.getByRole('button', { name: /^Same/ }).isEnabled(), { timeout: POLL_MS }).toBe(true);
    await page.waitForLoadState('networkidle');
    await page.keyboard.press('s');
    await expect.poll(candidate, { timeout: POLL_MS }).not.toBe(before);
    // There is something to undo once the verdict has been kept.
    await expect.poll(() => page.getByRole('button', { name: /Undo/ }).isEnabled(), { timeout: POLL_MS }).toBe(true);
    await page.keyboard.press('z');
    await expect.poll(candidate, { timeout: POLL_MS }).toBe(before);
  });

  it('finds an object under any spelling of any of its names, and writes a note on it', async () => {
    await page.goto(at('today'));
    await page.getByText('What changed').waitFor();
    await page.keyboard.press('/');
    await page.keyboard.type('ic0335');
    await page.keyboard.press('Enter');
    await page.getByRole('heading', { name: 'Found' }).waitFor();
    await page.locator('main').getByRole('link', { name: /^#\d+/ }).first().click();
    await page.getByRole('heading', { level: 1, name: /#\d+/ }).waitFor();
    await page.getByText('from BETA row').first().waitFor();
    await page.getByLabel('Write a note').fill('An **edge-on** one.');
    await page.getByRole('button', { name: 'Keep the note' }).click();
    await page.locator('strong', { hasText: 'edge-on' }).waitFor();
  });

  it('downloads one merged table with both catalogues in a row', async () => {
    await page.goto(at('editions'));
    await page.getByRole('region', { name: 'First rows of the merged table' }).waitFor();
    const pending = page.waitForEvent('download');
    await page.getByRole('link', { name: 'Download CSV' }).click();
    const download = await pending;
    const lines = readFileSync(await download.path(), 'utf8').trim().split('\r\n');
    const header = lines[0]?.split(',') ?? [];
    expect(header.slice(0, 4)).toEqual(['object', 'name', 'ra_deg', 'dec_deg']);
    expect(header).toContain('ALPHA.sep_arcsec');
    expect(header).toContain('BETA.designation');
    const objects = (await bw.world.agents.reader.get(bw.world.api('objects?limit=1'))).body as { total: number };
    expect(lines.length - 1).toBe(objects.total);
    // Objects that the policy joined carry its grade.
    expect(lines.filter((line) => line.includes(',probable,')).length).toBeGreaterThan(100);
  });
});
