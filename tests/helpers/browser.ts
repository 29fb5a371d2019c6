import { mkdirSync } from 'node:fs';
import path from 'node:path';
import { type Browser, type BrowserContext, type BrowserContextOptions, chromium, type Page } from 'playwright-core';
import { afterAll, afterEach, beforeAll, expect, onTestFailed } from 'vitest';
import { CHROMIUM } from '@/cli/local/debian';
import { LOCAL } from '@/cli/local/places';

const FLAGS = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
];

/** Debian's Chromium, once a test file. */
export function useBrowser(): { open: (options?: BrowserContextOptions) => Promise<Page> } {
  let browser: Browser | undefined;
  let contexts: BrowserContext[] = [];
  let trouble: string[] = [];

  beforeAll(async () => {
    browser = await chromium.launch({ executablePath: CHROMIUM, headless: true, args: FLAGS });
  });
  afterAll(() => browser?.close());
  afterEach(async () => {
    const seen = trouble;
    await Promise.all(contexts.map((context) => context.close()));
    contexts = [];
    trouble = [];
    expect(seen, 'errors in the page').toEqual([]);
  });

  /** A fresh window; what goes wrong in the page fails the test, unless `allow` names it. */
  const open = async (options: BrowserContextOptions = {}): Promise<Page> => {
    if (!browser) throw new Error('The browser is opened before the tests.');
    const context = await browser.newContext({ viewport: { width: 1440, height: 900 }, ...options });
    contexts.push(context);
    const page = await context.newPage();
    page.on('pageerror', (error) => trouble.push(`page: ${error.message}`));
    page.on('console', (message) => {
      // A refused request (401, 404, 409) is told by the page itself; the browser's own line adds nothing.
      if (message.type() === 'error' && !message.text().startsWith('Failed to load resource'))
        trouble.push(`console: ${message.text()}`);
    });
    page.on('response', (response) => {
      if (response.status() >= 500) trouble.push(`${response.status()} ${response.url()}`);
    });
    onTestFailed(async ({ task }) => {
      const folder = path.join(LOCAL, 'screenshots');
      mkdirSync(folder, { recursive: true });
      const name = task.name.replaceAll(/[^a-z0-9]+/gi, '-').slice(0, 80);
      if (!page.isClosed()) await page.screenshot({ path: path.join(folder, `${name}.png`), fullPage: true });
    });
    return page;
  };
  return { open };
}
