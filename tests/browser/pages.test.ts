import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { axeFindings, openBrowserWorld, overflows, type BrowserWorld } from '../support/browser-world';
import { addCatalogue, runJobs } from '../support/fixtures';

/** Every page below a group, with what shows that it has loaded. */
const PAGES: readonly { path: string; shows: string | RegExp }[] = [
  { path: 'today', shows: 'What changed' },
  { path: 'catalogues', shows: 'Catalogue LEFT' },
  { path: 'catalogues/LEFT', shows: 'At a glance' },
  { path: 'catalogues/LEFT?tab=columns', shows: 'right ascension' },
  { path: 'catalogues/new', shows: 'Choose a file' },
  { path: 'cross-match', shows: 'A pair of lists' },
  { path: 'cross-match/new', shows: /radius/i },
  { path: 'cross-match/1', shows: 'Policy for clear cases' },
  { path: 'review', shows: /undecided/ },
  { path: 'review/1', shows: 'The two sources' },
  { path: 'objects', shows: 'LEFT 1' },
  { path: 'objects/1', shows: 'Sources and measurements' },
  { path: 'find?q=left1', shows: 'Found' },
  { path: 'find?q=lefd%201', shows: 'Not taken, only near' },
  { path: 'references', shows: 'No citation has been given' },
  { path: 'editions', shows: 'First rows' },
  { path: 'group', shows: 'Who did what' },
];

describe('every page', () => {
  let bw: BrowserWorld;
  let page: Page;
  const errors: string[] = [];
  beforeAll(async () => {
    bw = await openBrowserWorld();
    const at = (i: number, shift: number) => ({ raDeg: 40 + i * 0.01 + shift, decDeg: -10 - i * 0.005, errArcsec: 0.3 });
    const places = Array.from({ length: 30 }, (_, i) => i);
    await addCatalogue(bw.world, { label: 'LEFT', sources: places.map((i) => at(i, 0)) });
    await addCatalogue(bw.world, { label: 'RIGHT', sources: places.map((i) => at(i, 0.0001)) });
    await bw.world.agents.curator
      .post(bw.world.api('runs'), { catalogues: ['LEFT', 'RIGHT'], radiusArcsec: 3, title: 'A pair of lists' })
      .expect(202);
    await runJobs(bw.world);
    page = await bw.open('owner');
    page.on('pageerror', (error) => errors.push(error.message));
    page.on('console', (message) => {
      if (message.type() === 'error') errors.push(`${page.url()}: ${message.text()}`);
    });
  });
  afterAll(() => bw.close());

  const open = async ({ path, shows }: (typeof PAGES)[number]) => {
    await page.goto(`${bw.url}/g/${bw.world.group}/${path}`);
    await page.locator('main').getByText(shows).first().waitFor();
  };

  it.each(PAGES)('$path has no axe finding in any theme, and one main heading', async (place) => {
    await page.setViewportSize({ width: 1440, height: 900 });
    await open(place);
    expect(await axeFindings(page)).toEqual([]);
    expect(await page.locator('h1').count()).toBe(1);
    expect(errors.splice(0)).toEqual([]);
  });

  it.each(PAGES)('$path fits a window of 390 pixels', async (place) => {
    await page.setViewportSize({ width: 390, height: 844 });
    await open(place);
    expect(await overflows(page)).toBe(false);
  });

  it('has no axe finding on the page for signing in', async () => {
    const stranger = await bw.open('nobody');
    await stranger.goto(`${bw.url}/sign-in`);
    await stranger.getByLabel('E-mail').waitFor();
    expect(await axeFindings(stranger)).toEqual([]);
  });

  it('leads a stranger to the sign-in, and a member of another group nowhere', async () => {
    const stranger = await bw.open('nobody');
    await stranger.goto(`${bw.url}/g/${bw.world.group}/today`);
    await stranger.getByRole('button', { name: 'Sign in' }).waitFor();
    const foreign = await bw.open('foreign');
    await foreign.goto(`${bw.url}/g/${bw.world.group}/today`);
    await foreign.getByRole('heading', { level: 1 }).waitFor();
    expect(await foreign.locator('body').innerText()).not.toContain('Test Group');
  });

  it('lets a reader look, and shows no button that would be refused', async () => {
    const reader = await bw.open('reader');
    await reader.goto(`${bw.url}/g/${bw.world.group}/objects/1`);
    await reader.getByText('Sources and measurements').waitFor();
    expect(await reader.getByRole('button', { name: /Retire|Prefer|Keep the note|Add$/ }).count()).toBe(0);
    await reader.goto(`${bw.url}/g/${bw.world.group}/catalogues/new`);
    await reader.getByText('may look at catalogues but not add any').waitFor();
  });

  it('makes the first account on an empty installation', async () => {
    await bw.world.context.database.pool.query('delete from person');
    const first = await bw.open('nobody');
    await first.goto(`${bw.url}/`);
    await first.getByLabel('Your name').fill('First Person');
    await first.getByLabel('E-mail').fill('first@example.org');
    await first.getByLabel(/password/i).first().fill('a long first password');
    await first.getByLabel('Name of the group').fill('First Group');
    expect(await axeFindings(first)).toEqual([]);
    await first.locator('button[type=submit]').click();
    await first.getByText('Three steps to a merged table').waitFor();
  });
});
