import AxeBuilder from '@axe-core/playwright';
import type { Browser, Page } from 'playwright-core';
import { startWorker } from '../../server/jobs/worker';
import { launchBrowser, openPage } from './chromium';
import { createWorld, listen, type World } from './world';

export const THEMES = ['paper', 'night', 'dome'] as const;
const WAIT_MS = 60_000;

/** A world with its server on a port, a worker that takes jobs, and a browser. */
export interface BrowserWorld {
  world: World;
  url: string;
  browser: Browser;
  /** A page in a fresh context; with a role, signed in as that person. */
  open(role: keyof World['agents'], size?: { width: number; height: number }): Promise<Page>;
  close(): Promise<void>;
}

export async function openBrowserWorld(): Promise<BrowserWorld> {
  const world = await createWorld();
  const server = await listen(world);
  const worker = await startWorker(world.context);
  const browser = await launchBrowser();
  return {
    world,
    url: server.url,
    browser,
    async open(role, size = { width: 1440, height: 900 }) {
      const page = await openPage(browser, { viewport: size, reducedMotion: 'reduce' });
      page.setDefaultTimeout(WAIT_MS);
      const { cookie } = world.agents[role];
      if (cookie !== null) {
        const [name = '', value = ''] = cookie.split('=');
        await page.context().addCookies([{ name, value, url: server.url }]);
      }
      return page;
    },
    async close() {
      await browser.close();
      await server.close();
      await worker.stop();
      await world.close();
    },
  };
}

/** What axe finds on a page in every theme, in words; empty when all is well. */
export async function axeFindings(page: Page): Promise<string[]> {
  const findings: string[] = [];
  for (const theme of THEMES) {
    await page.evaluate((name) => document.documentElement.setAttribute('data-theme', name), theme);
    const { violations } = await new AxeBuilder({ page }).analyze();
    findings.push(
      ...violations.map(
        (one) => `${theme}: ${one.id} (${one.help}) at ${one.nodes.map((node) => node.target.join(' ')).join(', ')}`,
      ),
    );
  }
  return findings;
}

/** True when the page is wider than its window: something is cut off or pushes out. */
export function overflows(page: Page): Promise<boolean> {
  return page.evaluate(() => document.documentElement.scrollWidth > document.documentElement.clientWidth);
}
