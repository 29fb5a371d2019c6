import { newWorkshop, startApp, TEST_PASSWORD, type TestApp, type TestPerson } from '@tests/helpers/app';
import { useBrowser } from '@tests/helpers/browser';
import type { Page } from 'playwright-core';
import { beforeAll, describe, expect, it } from 'vitest';

const browser = useBrowser();
let app: TestApp;
let lead: TestPerson;

beforeAll(async () => {
  app = await startApp();
  lead = await newWorkshop(app, 'Reed bench');
  for (const name of ['Heron', 'Bittern', 'Avocet'])
    await lead.visitor.send('POST', '/api/v1/machines', { name, state: name === 'Heron' ? 'accepted' : 'being-built' });
});

async function signedIn(): Promise<Page> {
  const page = await browser.open();
  await page.goto(`${app.url}/sign-in?next=/machines`);
  await page.getByLabel('E-mail').fill(lead.email);
  await page.getByLabel('Password').fill(TEST_PASSWORD);
  await page.keyboard.press('Enter');
  await page.waitForURL((url) => url.pathname === '/machines');
  await page.waitForLoadState('networkidle');
  return page;
}

const names = (page: Page): Promise<string[]> => page.locator('tbody th a').allInnerTexts();

describe('the list of machines', () => {
  it('sorts, finds and goes back, all of it in the address', async () => {
    const page = await signedIn();
    expect(await names(page)).toEqual(['Avocet', 'Bittern', 'Heron']);
    await page.locator('thead').getByRole('link', { name: 'Machine' }).click();
    await expect.poll(() => names(page)).toEqual(['Heron', 'Bittern', 'Avocet']);
    await page.getByLabel('State').selectOption('accepted');
    await expect.poll(() => names(page)).toEqual(['Heron']);
    const address = page.url();
    await page.goBack();
    await expect.poll(() => names(page)).toEqual(['Heron', 'Bittern', 'Avocet']);
    await page.goto(address);
    expect(await names(page)).toEqual(['Heron']);
    await page.getByLabel('State').selectOption('');
    await page.getByLabel('Find').fill('bit');
    await expect.poll(() => names(page)).toEqual(['Bittern']);
    await page.getByLabel('Find').fill('no such machine');
    await page.getByRole('button', { name: 'Show all machines' }).click();
    await expect.poll(async () => (await names(page)).length).toBe(3);
  });
});

describe('entering and changing a machine', () => {
  it('draws the layout as it is typed, says what is wrong at its field, and what saving does', async () => {
    const page = await signedIn();
    await page.getByRole('link', { name: 'Enter a machine' }).click();
    await page.getByRole('textbox', { name: 'Name' }).fill('Dunlin');
    await page.getByRole('button', { name: 'Wide' }).click();
    expect(await page.getByRole('textbox', { name: 'Result wheels' }).inputValue()).toBe('15');
    await page.getByRole('textbox', { name: 'Result wheels' }).fill('40');
    await page.getByRole('button', { name: 'Enter the machine' }).click();
    // Not sent: the field says why, and has the focus.
    expect(await page.getByRole('textbox', { name: 'Result wheels' }).getAttribute('aria-invalid')).toBe('true');
    expect(await page.evaluate(() => document.activeElement?.getAttribute('name'))).toBe('resultWheels');
    await page.getByRole('textbox', { name: 'Result wheels' }).fill('16');
    await page.getByRole('button', { name: 'Enter the machine' }).click();
    await page.getByRole('heading', { level: 1, name: 'Dunlin' }).waitFor();
    const id = page.url().split('/').at(-1);
    await lead.visitor.send('POST', '/api/v1/runs', { machine: id });
    await page.goto(`${app.url}/machines/${id}/edit`);
    await page.waitForLoadState('networkidle');
    await page.getByRole('textbox', { name: 'Setting slides' }).fill('9');
    await page.getByText('Saving makes revision 2').waitFor();
    // A name that is taken is refused at its field, and nothing typed is lost.
    await page.getByRole('textbox', { name: 'Name' }).fill('Heron');
    await page.getByRole('button', { name: 'Save the machine' }).click();
    await page.getByText('choose another name').first().waitFor();
    expect(await page.getByRole('textbox', { name: 'Setting slides' }).inputValue()).toBe('9');
    await page.getByRole('textbox', { name: 'Name' }).fill('Dunlin');
    await page.getByRole('button', { name: 'Save the machine' }).click();
    await page.getByText('Revision 2', { exact: true }).first().waitFor();
  });
});
