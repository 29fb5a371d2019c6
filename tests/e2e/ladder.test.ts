import { AxeBuilder } from '@axe-core/playwright';
import { newWorkshop, startApp, type TestApp, type TestPerson } from '@tests/helpers/app';
import { useBrowser } from '@tests/helpers/browser';
import type { Page } from 'playwright-core';
import { beforeAll, describe, expect, it } from 'vitest';
import { acceptLayout } from '@/lib/mechanism/layout';
import { createMachine } from '@/lib/mechanism/machine';

const TAGS = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'];
const WIDTHS = [390, 820, 1440] as const;

let app: TestApp;
beforeAll(async () => {
  app = await startApp();
});
const browser = useBrowser();

/** The home page once its machine can be worked. */
async function openHome(options: Parameters<typeof browser.open>[0] = {}): Promise<Page> {
  const page = await browser.open(options);
  await page.goto(app.url);
  await page.locator('astro-island:not([ssr])').first().waitFor({ state: 'attached' });
  return page;
}

const rowOf = (page: Page, step: number) => page.locator(`.ladder tbody tr[data-index="${step - 1}"]`);

describe('the ladder on the home page', () => {
  it('says before any script that the carry into wheel 2 was missed', async () => {
    const page = await browser.open({ javaScriptEnabled: false });
    await page.goto(app.url);
    const row = page.getByRole('row', { name: /^3 one wheel wrong turn/ });
    expect(await row.getByRole('cell', { name: 'wheel 2: 0, expected 1, carry missed' }).count()).toBe(1);
  });

  it('is a table: heads number the wheels, rows are named by their step, all rows are counted', async () => {
    const page = await openHome();
    const table = page.locator('.ladder').getByRole('table');
    expect(await table.getAttribute('aria-rowcount')).toBe('8');
    const heads = await table.getByRole('columnheader').allInnerTexts();
    const named = heads.map((text) => text.replace(/\s+/g, ' ').trim());
    expect(named.filter((text) => !text.includes('wheel'))).toEqual(['Step', 'Result register', 'Counter']);
    expect(named.filter((text) => text.startsWith('wheel')).map((text) => text.replace('wheel ', ''))).toEqual([
      '8',
      '7',
      '6',
      '5',
      '4',
      '3',
      '2',
      '1',
    ]);
    expect(await table.getByRole('rowheader').count()).toBe(6);
    expect(await rowOf(page, 6).getAttribute('aria-rowindex')).toBe('8');
  });

  it('flags a fault given by hand at the next turn that shows it, and no healthy turn', async () => {
    const page = await openHome();
    await page.getByLabel('Give it a fault').selectOption('none');
    await page.getByRole('button', { name: 'New ladder' }).click();
    for (let turn = 0; turn < 4; turn += 1) await page.getByRole('button', { name: 'Add +' }).click();
    expect(await page.getByText('rows with faults').count()).toBe(0);
    await page.getByLabel('Give it a fault').selectOption('wheel-over');
    await page.getByLabel('Wheel', { exact: true }).selectOption('1');
    await page.getByRole('button', { name: 'Add +' }).click();
    expect(await rowOf(page, 6).locator('[data-verdict="differs"]').count()).toBe(1);
    // 7, 14, 21, 28 and then 35, with the lowest wheel one step too far.
    expect(await page.locator('p[role="status"]').textContent()).toBe(
      'Step 6, one turn adding. Wheel 1 shows 6, 5 was expected: one step too far.',
    );
  });

  it('is worked by keyboard alone', async () => {
    const page = await openHome();
    await page.getByRole('spinbutton', { name: 'Slide 2' }).focus();
    await page.keyboard.press('3');
    await page.keyboard.press('ArrowUp');
    expect(await page.getByRole('spinbutton', { name: 'Slide 2' }).getAttribute('aria-valuenow')).toBe('4');
    await page.keyboard.press('+');
    await page.keyboard.press('-');
    expect(await page.locator('.ladder .turn-words').allInnerTexts()).toEqual([
      'set 7',
      ...Array<string>(5).fill('turn + ×1'),
      'set 47',
      'turn + ×1',
      'turn − ×1',
    ]);
    await page.locator('.ladder').focus();
    await page.keyboard.press('Home');
    expect(await rowOf(page, 1).getAttribute('aria-current')).toBe('true');
    await page.keyboard.press('n');
    expect(await rowOf(page, 3).getAttribute('aria-current')).toBe('true');
    expect(await page.getByRole('region', { name: 'Step 3 in detail' }).textContent()).toContain(
      'Wheel 2 shows 0, 1 was expected: the carry from wheel 1 was due and was not made.',
    );
    await page.keyboard.press('n');
    await page.keyboard.press('p');
    expect(await rowOf(page, 3).getAttribute('aria-current')).toBe('true');
  });

  it.each(WIDTHS)('keeps within the window at %i px, targets large enough, nothing against WCAG', async (width) => {
    for (const colorScheme of ['light', 'dark'] as const) {
      const page = await openHome({ viewport: { width, height: 900 }, colorScheme });
      const wider = await page.evaluate(() => document.documentElement.scrollWidth - window.innerWidth);
      expect(wider).toBeLessThanOrEqual(0);
      const small = await page.locator('main button:visible').evaluateAll((buttons) =>
        buttons.flatMap((button) => {
          const { width: wide, height } = button.getBoundingClientRect();
          return wide < 44 || height < 44 ? [`${button.textContent}: ${wide} × ${height}`] : [];
        }),
      );
      expect(small).toEqual([]);
      const { violations } = await new AxeBuilder({ page }).withTags(TAGS).analyze();
      expect(violations.map(({ id, nodes }) => `${id}: ${nodes.map(({ html }) => html).join(' ')}`)).toEqual([]);
    }
  });

  it('shows all wheels of a small machine at 390 px without scrolling', async () => {
    const page = await openHome({ viewport: { width: 390, height: 844 } });
    const frame = page.locator('.ladder');
    expect(await frame.evaluate(({ scrollWidth, clientWidth }) => scrollWidth - clientWidth)).toBe(0);
  });
});

describe('pages without an island', () => {
  it.each(['/sign-in', '/sign-up'])('%s sends no script', async (path) => {
    const html = await (await fetch(new URL(path, app.url))).text();
    expect(html).toContain('<h1');
    expect(html).not.toMatch(/<script|modulepreload|astro-island/);
  });

  it('follows the device or the theme chosen by a plain form', async () => {
    const page = await browser.open({ javaScriptEnabled: false, colorScheme: 'light' });
    await page.goto(`${app.url}/sign-in`);
    const paper = () => page.evaluate(() => getComputedStyle(document.documentElement).backgroundColor);
    const day = await paper();
    await page.getByRole('button', { name: 'Night' }).click();
    expect(new URL(page.url()).pathname).toBe('/sign-in');
    expect(await page.locator('html').getAttribute('data-theme')).toBe('dark');
    expect(await paper()).not.toBe(day);
    expect(await page.getByRole('button', { name: 'Night' }).getAttribute('aria-pressed')).toBe('true');
  });
});

const ROWS = 9_999;

/** A run of ten thousand rows as a file: a machine that misses its carry now and then, as it was read. */
function longRun(): string {
  const accepted = acceptLayout({});
  if (!accepted.ok) throw new Error('not a layout');
  const machine = createMachine(accepted.value, { faults: [{ kind: 'carry-missed', wheel: 2, rate: 0.02 }], seed: 7 });
  machine.apply({ do: 'set', slides: '7' });
  const lines = Array.from({ length: ROWS }, () => {
    const { result, counter } = machine.apply({ do: 'turn', way: 'add' });
    return `turn,,add,${result},${counter}`;
  });
  return ['do,slides,way,result,counter', 'set,7,,,', ...lines, ''].join('\r\n');
}

/** Stores a file as a run of a new machine; answers with the run's address. */
async function importRun(lead: TestPerson, content: string): Promise<string> {
  const made = await lead.visitor.send('POST', '/api/v1/machines', { name: 'Long run', serial: 'L-1', layout: {} });
  const { id: machine } = (await made.json()) as { id: string };
  const send = (path: string): Promise<Response> =>
    lead.visitor.fetch(path, { method: 'POST', body: content, headers: { 'content-type': 'text/csv' } });
  const checked = (await (await send(`/api/v1/imports/check?machine=${machine}&name=long.csv`)).json()) as {
    sha256: string;
  };
  const stored = await send(`/api/v1/imports?machine=${machine}&name=long.csv&sha256=${checked.sha256}`);
  expect(stored.status).toBe(201);
  return `/runs/${((await stored.json()) as { id: string }).id}`;
}

/** Scrolls a frame step by step, then jumps about in it; times in milliseconds. */
async function scrollThrough(page: Page): Promise<{ median: number; slowest: number; drawn: number; blank: number }> {
  return page.locator('.ladder').evaluate(async (frame) => {
    const next = () => new Promise<number>((resolve) => requestAnimationFrame(resolve));
    const times: number[] = [];
    let last = await next();
    for (let step = 0; step < 200; step += 1) {
      frame.scrollTop += 120;
      const now = await next();
      times.push(now - last);
      last = now;
    }
    let blank = 0;
    for (let jump = 1; jump <= 20; jump += 1) {
      frame.scrollTop = ((jump * 0.618) % 1) * frame.scrollHeight;
      await next();
      await next();
      const { left, top, width, height } = frame.getBoundingClientRect();
      const seen = document.elementFromPoint(left + width / 4, top + height / 2);
      if (!seen?.closest('tr[data-index]')) blank += 1;
    }
    times.sort((a, b) => a - b);
    const drawn = frame.querySelectorAll('tr[data-index]').length;
    return { median: times[100] ?? 0, slowest: times.at(-1) ?? 0, drawn, blank };
  });
}

describe('a run of ten thousand rows', () => {
  it('scrolls smoothly, draws only what is in sight, and is searched by key', async () => {
    const lead = await newWorkshop(app);
    const address = await importRun(lead, longRun());
    const page = await browser.open();
    await page.context().addCookies([...lead.visitor.cookies].map(([name, value]) => ({ name, value, url: app.url })));
    await page.goto(app.url + address);
    await page.locator('astro-island:not([ssr]) .ladder').waitFor();
    const frame = page.locator('.ladder');
    expect(await frame.getByRole('table').getAttribute('aria-rowcount')).toBe(String(ROWS + 1 + 2));
    const scrolled = await scrollThrough(page);
    expect(scrolled.drawn).toBeLessThan(80);
    expect(scrolled.blank).toBe(0);
    // A screen of 60 frames a second is 17 ms; the bound leaves room for a busy test machine without a graphics card.
    expect(scrolled.median).toBeLessThan(50);
    await frame.focus();
    await page.keyboard.press('End');
    const last = page.locator('tr[aria-current]');
    expect(await last.getAttribute('aria-rowindex')).toBe(String(ROWS + 1 + 2));
    await page.keyboard.press('p');
    await page.locator('tr[aria-current] [data-carry="missed"]').waitFor();
  });
});
