import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import type { Fault } from '../mechanism/faults';
import { acceptLayout } from '../mechanism/layout';
import { createMachine } from '../mechanism/machine';
import type { Step } from '../mechanism/steps';
import { type RunFile, readRunCsv } from './csv-read';
import { writeRunCsv } from './csv-write';
import { decodeCsv } from './decode';

const folder = new URL('../../../fixtures/runs/', import.meta.url);
const accepted = acceptLayout({});
if (!accepted.ok) throw new Error('the usual layout is no layout');
const usual = accepted.value;

function textOf(name: string): string {
  const decoded = decodeCsv(readFileSync(new URL(name, folder)));
  if (!decoded.ok) throw new Error(`${name} is not UTF-8`);
  return decoded.value;
}

const fileOf = (name: string): RunFile => readRunCsv(textOf(name), usual);
const stepsOf = (name: string): readonly Step[] => fileOf(name).rows.map(({ step }) => step);

/** What a healthy machine shows, by whole numbers alone: shares nothing with the simulator. */
function byArithmetic(steps: readonly Step[]): { result: string; counter: string }[] {
  const [most, mostCounted] = [10n ** 11n, 10n ** 6n];
  let [result, counter, slides, shift] = [0n, 0n, 0n, 1n];
  return steps.map((step) => {
    if (step.do === 'set') slides = BigInt(step.slides);
    if (step.do === 'shift') shift = 10n ** BigInt(step.to - 1);
    if (step.do === 'clear' && step.what !== 'counter') result = 0n;
    if (step.do === 'clear' && step.what !== 'result') counter = 0n;
    if (step.do === 'turn') {
      const by = BigInt(step.times ?? 1) * shift * (step.way === 'add' ? 1n : -1n);
      result = (((result + by * slides) % most) + most) % most;
      counter = (((counter + by) % mostCounted) + mostCounted) % mostCounted;
    }
    return { result: String(result).padStart(11, '0'), counter: String(counter).padStart(6, '0') };
  });
}

/** What the simulator shows after every step, with a fault in that of one index alone. */
function bySimulator(steps: readonly Step[], faultAt = -1, fault?: Fault): { result: string; counter: string }[] {
  let [result, counter] = ['0'.repeat(11), '0'.repeat(6)];
  const before: Step[] = [];
  return steps.map((step, index) => {
    const faults = fault && index === faultAt ? [fault] : [];
    const machine = createMachine(usual, { start: { result, counter }, faults });
    // Slides and carriage stand as the steps before left them; the registers start as they were.
    for (const earlier of before) machine.advance(earlier);
    ({ result, counter } = machine.apply(step));
    if (step.do === 'set' || step.do === 'shift' || step.do === 'reverse') before.push(step);
    return { result, counter };
  });
}

const agree = (steps: readonly Step[], shown: readonly { result: string; counter: string }[]): void => {
  let readings = 0;
  steps.forEach(({ read }, index) => {
    if (!read) return;
    readings += 1;
    expect(read, `step ${index + 1}`).toEqual(shown[index]);
  });
  expect(readings).toBeGreaterThan(3);
};

describe('fixtures/runs', () => {
  it.each(['smoke-test.csv', 'smoke-test-carry-missed.csv', 'nines-ripple.csv'])('%s is canonical', (name) => {
    const file = fileOf(name);
    expect(file).toMatchObject({ problems: [], remarks: [] });
    expect(file.rows.flatMap(({ remarks }) => remarks)).toEqual([]);
    expect(writeRunCsv(file.rows.map(({ step }) => step))).toBe(textOf(name));
  });

  it.each(['smoke-test.csv', 'nines-ripple.csv', 'leading-zeros-stripped.csv', 'semicolon-bom.csv', 'tab-lf.csv'])(
    '%s shows a healthy machine, by arithmetic and by the simulator',
    (name) => {
      const steps = stepsOf(name);
      agree(steps, byArithmetic(steps));
      agree(steps, bySimulator(steps));
    },
  );

  it('the smoke test is the one of the trade: 7/1 to 63/9', () => {
    const turns = stepsOf('smoke-test.csv').filter((step) => step.do === 'turn');
    expect(turns.map(({ read }) => `${Number(read?.result)}/${Number(read?.counter)}`)).toEqual([
      '7/1',
      '14/2',
      '21/3',
      '28/4',
      '35/5',
      '42/6',
      '49/7',
      '56/8',
      '63/9',
    ]);
  });

  it('one carry into wheel 2 is missed at turn 5, and every later turn follows from there', () => {
    const steps = stepsOf('smoke-test-carry-missed.csv');
    const fifthTurn = steps.findIndex(({ read }) => read?.counter === '000005');
    agree(steps, bySimulator(steps, fifthTurn, { kind: 'carry-missed', wheel: 2 }));
    expect(steps.slice(fifthTurn).map(({ read }) => Number(read?.result))).toEqual([25, 32, 39, 46, 53]);
  });

  it('lost leading zeros are filled and said; the rest is the smoke test', () => {
    const file = fileOf('leading-zeros-stripped.csv');
    expect(file.problems).toEqual([]);
    expect(file.rows.map(({ step }) => step)).toEqual(stepsOf('smoke-test.csv'));
    const said = file.rows.flatMap(({ remarks }) => remarks).filter(({ code }) => code === 'zeros-filled');
    expect(said).toHaveLength(20);
  });

  it('exponents are refused where they stand, and nothing else is', () => {
    const { problems, rows } = fileOf('exponents.csv');
    expect(problems.map(({ line, column, code }) => `${line} ${column} ${code}`)).toEqual(
      [5, 6, 7, 10].map((line) => `${line} result has-exponent`),
    );
    expect(rows).toHaveLength(5);
  });

  it('semicolons, tabs, LF and a byte order mark are read, and each is said', () => {
    const semicolons = fileOf('semicolon-bom.csv');
    const tabs = fileOf('tab-lf.csv');
    expect(semicolons).toMatchObject({ problems: [], dialect: { delimiter: ';', newline: 'crlf', bom: true } });
    expect(tabs).toMatchObject({ problems: [], dialect: { delimiter: '\t', newline: 'lf', bom: false } });
    expect(semicolons.remarks.map(({ code }) => code)).toEqual(['byte-order-mark', 'semicolons']);
    expect(tabs.remarks.map(({ code }) => code)).toEqual(['tabs', 'lf-line-ends']);
    expect(semicolons.rows.map(({ step }) => step)).toEqual(tabs.rows.map(({ step }) => step));
  });

  it('every problem of many-problems.csv is found at once, at its line and column', () => {
    const { problems, rows, remarks } = fileOf('many-problems.csv');
    expect(problems.map(({ line, column, code }) => `${line} ${column} ${code}`)).toEqual([
      '1 Tester unknown-column',
      '3 slides digit-beyond-slides',
      '5 way not-one-of',
      '6 step step-repeated',
      '6 result has-sign',
      '6 time bad-time',
      '7 times out-of-range',
      '7 result too-many-glyphs',
      '7 counter bad-glyph',
      '7 time time-without-offset',
      '8 carriage out-of-range',
      '8 time bad-time',
      '9 carriage not-for-this-operation',
      '9 result has-exponent',
      '9 counter has-decimal-point',
      '10 do do-unclear',
      '11 null field-count',
      '12 step step-falling',
      '12 reverse not-one-of',
    ]);
    expect(rows.map(({ line }) => line)).toEqual([2, 14]);
    expect(remarks.map(({ line, code }) => `${line} ${code}`)).toEqual([
      '1 header-tidied',
      '1 header-tidied',
      '13 blank-row',
    ]);
  });

  it('every file is tested here and told of in fixtures/README.md', () => {
    const readme = readFileSync(new URL('../README.md', folder), 'utf8');
    const own = readFileSync(new URL(import.meta.url), 'utf8');
    for (const name of readdirSync(folder).filter((each) => each.endsWith('.csv'))) {
      expect(readme).toContain(name);
      expect(own).toContain(`'${name}'`);
    }
  });
});
