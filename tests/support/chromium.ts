import { chromium, type Browser, type BrowserContextOptions, type Page } from 'playwright-core';

const EXECUTABLE = process.env.IDEM_CHROMIUM ?? '/usr/bin/chromium';

/** No GPU (the tests run on servers), no sandbox (they run as root), and no calls to the outside. */
const FLAGS = [
  '--headless',
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

/** Starts the browser of the tests; close it in `afterAll`. */
export function launchBrowser(): Promise<Browser> {
  return chromium.launch({ executablePath: EXECUTABLE, args: FLAGS });
}

/** A page in a context of its own (own cookies); axe refuses pages that share the browser's default context. */
export async function openPage(browser: Browser, options: BrowserContextOptions = {}): Promise<Page> {
  const context = await browser.newContext({ locale: 'en-GB', timezoneId: 'UTC', ...options });
  return context.newPage();
}
