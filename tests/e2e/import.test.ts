import { readFileSync } from 'node:fs';
import { newPerson, newWorkshop, startApp, TEST_PASSWORD, type TestApp, type TestPerson } from '@tests/helpers/app';
import { useBrowser } from '@tests/helpers/browser';
import type { Page } from 'playwright-core';
import { beforeAll, describe, expect, it } from 'vitest';

const browser = useBrowser();
let app: TestApp;
let tester: TestPerson;

const fixture = (name: string): string => new URL(`../../fixtures/runs/${name}.csv`, import.meta.url).pathname;

beforeAll(async () => {
  app = await startApp();
  const lead = await newWorkshop(app, 'Fen bench');
  tester = await newPerson(app, lead, 'tester');
  await lead.visitor.send('POST', '/api/v1/machines', { name: 'Dotterel' });
  await lead.visitor.send('POST', '/api/v1/machines', { name: 'Wide one', layout: { resultWheels: 15 } });
});

async function openImport(): Promise<Page> {
  const page = await browser.open();
  await page.goto(`${app.url}/sign-in`);
  await page.fill('[name=email]', tester.email);
  await page.fill('[name=password]', TEST_PASSWORD);
  await page.keyboard.press('Enter');
  await page.waitForURL(/\/machines$/);
  await page.goto(`${app.url}/runs/import`);
  await page.waitForFunction(() => document.querySelector('astro-island:not([ssr])') !== null);
  return page;
}

async function choose(page: Page, name: string, machine = 'Dotterel'): Promise<void> {
  await page.getByLabel('Machine').selectOption({ label: machine });
  await page.setInputFiles('input[type=file]', fixture(name));
}

const runs = async (): Promise<unknown[]> =>
  ((await (await tester.visitor.get('/api/v1/runs')).json()) as { runs: unknown[] }).runs;

describe('importing a run', () => {
  it('shows every row, stores nothing until told to, and gives the file back byte for byte', async () => {
    const page = await openImport();
    await choose(page, 'smoke-test-carry-missed');
    await page.getByText('11 steps understood').waitFor();
    expect(await page.locator('.ladder tr.reading').count()).toBe(10);
    expect(await page.locator('.ladder .turn-flag').count()).toBe(1);
    expect(await page.locator('table.record tbody tr').count()).toBe(11);
    expect(await runs()).toEqual([]);

    await page.getByRole('button', { name: 'Store 11 steps as a run' }).click();
    await page.waitForURL(/\/runs\/[0-9a-f-]{36}$/);
    await page.getByText('Step 7, turn 5: wheel 2 took no carry from wheel 1.').waitFor();
    const original = readFileSync(fixture('smoke-test-carry-missed'));
    for (const link of ['Run as CSV', 'smoke-test-carry-missed.csv']) {
      const [download] = await Promise.all([
        page.waitForEvent('download'),
        page.getByRole('link', { name: link }).click(),
      ]);
      expect(readFileSync(await download.path()).equals(original), link).toBe(true);
    }

    await page.goto(`${app.url}/runs/import`);
    await page.waitForFunction(() => document.querySelector('astro-island:not([ssr])') !== null);
    await choose(page, 'smoke-test-carry-missed');
    await page.getByText('The very same file is run 1 on Dotterel already.').waitFor();
    expect(await runs()).toHaveLength(1);
  });

  it('names line, column, what is wrong and the cure, and offers nothing to store', async () => {
    const page = await openImport();
    await choose(page, 'exponents');
    await page.getByText('4 problems in this file').waitFor();
    const rows = page.locator('table.record tbody tr', { hasText: 'Wrong:' });
    expect(await rows.count()).toBe(4);
    const first = (await rows.first().textContent()) ?? '';
    for (const part of ['5', 'result', '1.23457E+10', 'shortened by a spreadsheet', 'Format the column as text'])
      expect(first).toContain(part);
    expect(await page.getByRole('button', { name: /^Store/ }).count()).toBe(0);
    // Another file takes the place of the first.
    await page.setInputFiles('input[type=file]', fixture('semicolon-bom'));
    await page.getByText('Fields are separated by semicolons.').waitFor();
    await page.getByText('The file begins with a byte order mark, which was skipped.').waitFor();
  });

  it('reads a file anew for another machine', async () => {
    const page = await openImport();
    await choose(page, 'smoke-test', 'Dotterel');
    await page.getByText('11 steps understood').waitFor();
    await page.getByLabel('Machine').selectOption({ label: 'Wide one' });
    await page.getByText('is shorter than the register: 4 wheels on the left taken as zero.').first().waitFor();
  });
});
