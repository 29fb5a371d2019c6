import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';

/** The tokens of a block of the style sheet, by the selector that opens it. */
function tokensOf(css: string, selector: string): Map<string, string> {
  const from = css.indexOf(`${selector} {`);
  if (from < 0) throw new Error(`No block ${selector}`);
  const block = css.slice(from, css.indexOf('}', from));
  return new Map([...block.matchAll(/--([a-z-]+): (#[0-9a-f]{6});/gu)].map(([, name = '', hex = '']) => [name, hex]));
}

/** Relative luminance and contrast ratio as WCAG 2.2 defines them. */
function luminance(hex: string): number {
  const channel = (at: number): number => {
    const value = Number.parseInt(hex.slice(at, at + 2), 16) / 255;
    return value <= 0.04045 ? value / 12.92 : ((value + 0.055) / 1.055) ** 2.4;
  };
  return 0.2126 * channel(1) + 0.7152 * channel(3) + 0.0722 * channel(5);
}
function contrast(one: string, other: string): number {
  const [light = 0, dark = 0] = [luminance(one), luminance(other)].sort((a, b) => b - a);
  return (light + 0.05) / (dark + 0.05);
}

const css = readFileSync(new URL('./global.css', import.meta.url), 'utf8');
const GROUNDS = ['paper', 'leaf', 'verdigris-wash'];
/** Text and what it stands on: at least 4.5 : 1 (WCAG 2.2, 1.4.3). */
const TEXT = [
  ...['ink', 'ink-soft', 'verdigris', 'vermilion'].flatMap((ink) => GROUNDS.map((ground) => [ink, ground] as const)),
  ['vermilion', 'vermilion-wash'],
  ['on-verdigris', 'verdigris'],
  ['on-vermilion', 'vermilion'],
  ['paper', 'ink'],
] as const;
/** Edges of controls and marks that carry meaning: at least 3 : 1 (1.4.11). */
const LINES = GROUNDS.map((ground) => ['rule-firm', ground] as const);

describe.each([':root', ':root[data-theme="dark"]'])('colours of %s', (selector) => {
  const tokens = tokensOf(css, selector);
  const token = (name: string): string => tokens.get(name) ?? '#none';

  it.each(TEXT)('%s on %s can be read', (ink, ground) => {
    expect(contrast(token(ink), token(ground))).toBeGreaterThanOrEqual(4.5);
  });
  it.each(LINES)('%s on %s can be seen', (line, ground) => {
    expect(contrast(token(line), token(ground))).toBeGreaterThanOrEqual(3);
  });
});

it('measures as the standard does: black on white is 21 : 1, #767676 on white just passes', () => {
  expect(contrast('#000000', '#ffffff')).toBeCloseTo(21, 5);
  expect(contrast('#767676', '#ffffff')).toBeGreaterThan(4.5);
  expect(contrast('#777777', '#ffffff')).toBeLessThan(4.5);
});

it('is the same at night by choice as by the device', () => {
  expect(tokensOf(css, ':root[data-theme="auto"]')).toEqual(tokensOf(css, ':root[data-theme="dark"]'));
});
