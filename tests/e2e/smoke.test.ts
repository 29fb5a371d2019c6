import { gzipSync } from 'node:zlib';
import { AxeBuilder } from '@axe-core/playwright';
import { newPerson, newWorkshop, startApp, TEST_PASSWORD, type TestApp, type TestPerson } from '@tests/helpers/app';
import { useBrowser } from '@tests/helpers/browser';
import type { Page } from 'playwright-core';
import { beforeAll, describe, expect, it } from 'vitest';

const browser = useBrowser();
let app: TestApp;
let tester: TestPerson;
let stranger: TestPerson;
let viewer: TestPerson;
let machine = '';
const TAGS = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];

/** The lowest slide at 7, nine turns; at turn 5 the carry into wheel 2 is missed, and what follows goes on from there. */
const READ = ['7', '14', '21', '28', '25', '32', '39', '46', '53'];

beforeAll(async () => {
  app = await startApp();
  const lead = await newWorkshop(app, 'Tidewater bench');
  tester = await newPerson(app, lead, 'tester');
  viewer = await newPerson(app, lead, 'viewer');
  stranger = await newPerson(app, await newWorkshop(app, 'Next door'), 'tester');
  const made = await lead.visitor.send('POST', '/api/v1/machines', { name: 'Plover' });
  machine = ((await made.json()) as { id: string }).id;
});

async function signIn(page: Page, email: string): Promise<void> {
  await page.goto(`${app.url}/sign-in`);
  await page.fill('[name=email]', email);
  await page.fill('[name=password]', TEST_PASSWORD);
  await page.keyboard.press('Enter');
  await page.waitForURL(/\/machines$/);
}

/** A window of somebody who has signed in already; only the first test does it by hand. */
async function openAs(person: TestPerson): Promise<Page> {
  const page = await browser.open();
  const cookies = [...person.visitor.cookies].map(([name, value]) => ({ name, value, url: app.url }));
  await page.context().addCookies(cookies);
  return page;
}

async function startRun(page: Page, title: string): Promise<string> {
  await page.goto(`${app.url}/runs/new?machine=${machine}`);
  await page.fill('[name=title]', title);
  await page.keyboard.press('Enter');
  await page.waitForURL(/\/runs\/[0-9a-f-]{36}$/);
  await page.waitForFunction(() => document.activeElement instanceof HTMLInputElement);
  return page.url();
}

const saved = (page: Page): Promise<unknown> => page.waitForSelector('[data-saving=saved]');

/** Steps whose row is flagged, by their numbers. */
const flagged = (page: Page): Promise<string[]> =>
  page.$$eval('.ladder tbody tr:has(.turn-flag)', (rows) =>
    rows.map((row) => row.querySelector('.turn-seq')?.textContent ?? ''),
  );

describe('the smoke test at the bench', () => {
  it('is logged by keys alone; the missed carry is flagged in its row and in no other', async () => {
    const page = await browser.open();
    await signIn(page, tester.email);
    const address = await startRun(page, 'Smoke test');
    await page.keyboard.type('s7\n');
    for (const [index, result] of READ.entries()) await page.keyboard.type(`${result} ${index + 1}\n`);
    await saved(page);
    await page.waitForFunction(() => document.querySelectorAll('.ladder tbody tr.reading').length === 9);
    expect(await flagged(page)).toEqual(['6']);
    const cell = page
      .locator('.ladder tbody tr', { has: page.locator('.turn-flag') })
      .locator('[data-verdict=differs]');
    expect(await cell.count()).toBe(1);
    expect(await cell.textContent()).toContain('wheel 2: 2, expected 3, carry missed');

    await page.reload();
    await page.waitForFunction(() => document.querySelectorAll('.ladder tbody tr.reading').length === 9);
    expect(await flagged(page)).toEqual(['6']);
    const kept = (await (await tester.visitor.get(`/api/v1${new URL(address).pathname}`)).json()) as {
      readings: number;
      disagreeing: number;
      firstFault: unknown;
    };
    expect(kept).toMatchObject({ readings: 9, disagreeing: 1, firstFault: { seq: 6, register: 'result', wheel: 2 } });

    const other = await browser.open();
    await signIn(other, stranger.email);
    expect((await other.goto(address))?.status()).toBe(404);
    expect((await stranger.visitor.get(`/api/v1${new URL(address).pathname}`)).status).toBe(404);
  });

  it('takes result and counter one by one, corrects, takes back, and finishes with a summary', async () => {
    const page = await openAs(tester);
    await startRun(page, 'By and by');
    await page.keyboard.type('s7\n7\n1\n14\n2\n12\n3\n');
    await saved(page);
    expect(await flagged(page)).toEqual(['4']);
    await page.keyboard.type('u');
    await page.keyboard.press('Enter');
    await page.waitForSelector('.ladder tr.withdrawn');
    expect(await flagged(page)).toEqual([]);
    await page.keyboard.type('12 3\n');
    await saved(page);
    await page.keyboard.type('e');
    await page.keyboard.press('ControlOrMeta+A');
    await page.keyboard.type('21/3');
    await page.keyboard.press('Tab');
    await page.keyboard.type('misread\n');
    await page.waitForFunction(() =>
      document.querySelector('.ladder tbody tr:last-child .note')?.textContent?.includes('corrected'),
    );
    expect(await flagged(page)).toEqual([]);
    await page.keyboard.type('f');
    await page.getByRole('button', { name: 'Finish run' }).click();
    await page.getByText('3 turns, 3 readings: all agree.').waitFor();
    await page.getByText('1 reading corrected, 1 step taken back').waitFor();
    expect(await page.locator('[aria-label=Entry]').count()).toBe(0);
  });

  it('loses nothing when the network goes, the page is loaded anew and the network comes back', async () => {
    const page = await openAs(tester);
    const address = await startRun(page, 'Out of reach');
    await page.route('**/steps', (route) => route.abort());
    await page.keyboard.type('s7\n7 1\n14 2\n');
    await page.waitForSelector('[data-saving=trying-again]');
    expect(await page.textContent('[data-saving]')).toContain('3 steps kept on this device');
    page.on('dialog', (dialog) => void dialog.accept());
    await page.unroute('**/steps');
    await page.goto(address);
    await saved(page);
    await page.waitForFunction(() => document.querySelectorAll('.ladder tbody tr.reading').length === 2);
    const run = (await (await tester.visitor.get(`/api/v1${new URL(address).pathname}`)).json()) as { steps: number };
    expect(run.steps).toBe(3);
  });

  it('tells two tabs on one run apart and puts the later behind the earlier', async () => {
    const page = await openAs(tester);
    const address = await startRun(page, 'Two tabs');
    const second = await page.context().newPage();
    await second.goto(address);
    await second.waitForFunction(() => document.activeElement instanceof HTMLInputElement);
    await page.keyboard.type('s7\n');
    await saved(page);
    await second.keyboard.type('7 1\n');
    await second.waitForSelector('[data-saving=stopped]');
    await second.getByRole('button', { name: 'Load the run, put mine after it' }).click();
    await saved(second);
    await second.waitForFunction(() => document.querySelectorAll('.ladder tbody tr:not(.space)').length === 2);
    expect(await flagged(second)).toEqual([]);
  });

  it('keeps what is typed by somebody who was signed out meanwhile, and saves it after signing in again', async () => {
    const page = await openAs(tester);
    await startRun(page, 'Signed out');
    await page.keyboard.type('s7\n');
    await saved(page);
    await page.context().clearCookies();
    await page.keyboard.type('7 1\n14 2\n');
    await page.getByText('You are signed out').waitFor();
    expect(await page.textContent('[data-saving]')).toContain('2 steps kept on this device');
    await signIn(await page.context().newPage(), tester.email);
    await page.getByRole('button', { name: 'Try again' }).click();
    await saved(page);
    expect(await flagged(page)).toEqual([]);
  });

  it('shows a viewer the run without a line to type in', async () => {
    const page = await openAs(tester);
    const address = await startRun(page, 'Looked on');
    const other = await openAs(viewer);
    await other.goto(address);
    await other.getByText('Nothing turned and nothing read yet.').waitFor();
    expect(await other.locator('[aria-label=Entry]').count()).toBe(0);
    expect(await other.getByRole('button', { name: 'Delete this empty run' }).count()).toBe(0);
    expect((await other.goto(`${app.url}/runs/new`))?.status()).toBe(403);
  });

  it('deletes a run only while nothing was logged in it', async () => {
    const page = await openAs(tester);
    const address = await startRun(page, 'Begun by mistake');
    await page.getByRole('button', { name: 'Delete this empty run' }).click();
    await page.getByRole('button', { name: 'Delete run' }).click();
    await page.waitForURL(/\/runs$/);
    expect((await page.goto(address))?.status()).toBe(404);
  });

  it('has nothing for axe to find, in the line, its dialogs and the list', async () => {
    const page = await openAs(tester);
    await startRun(page, 'Looked through');
    await page.keyboard.type('s7\n7 1\n15 2\n');
    await saved(page);
    const found = async (): Promise<string[]> =>
      (await new AxeBuilder({ page }).withTags(TAGS).analyze()).violations.map(({ id }) => id);
    expect(await found()).toEqual([]);
    for (const key of ['k', 'e']) {
      await page.keyboard.type(key);
      await page.waitForSelector('dialog[open]');
      expect(await found(), key).toEqual([]);
      await page.keyboard.press('Escape');
      await page.waitForSelector('dialog[open]', { state: 'detached' });
    }
    await page.goto(`${app.url}/runs?trouble=differs&sort=turns`);
    expect(await page.locator('tbody tr').count()).toBeGreaterThan(0);
    expect(await found()).toEqual([]);
  });

  it('sends the run’s page less than 130 kB of script', async () => {
    const page = await openAs(tester);
    const address = await startRun(page, 'Weighed');
    const addresses = new Set<string>();
    page.on('response', (response) => {
      if (response.request().resourceType() === 'script') addresses.add(response.url());
    });
    await page.goto(address);
    await page.waitForLoadState('networkidle');
    const sizes = await Promise.all(
      [...addresses].map(async (url) => gzipSync(new Uint8Array(await (await fetch(url)).arrayBuffer())).byteLength),
    );
    const total = sizes.reduce((sum, size) => sum + size, 0);
    expect(total).toBeGreaterThan(0);
    expect(total).toBeLessThan(130 * 1024);
  });
});
