import { describe, expect, it } from 'vitest';
import {
  formatBytes,
  formatCount,
  formatDate,
  formatDay,
  formatDuration,
  formatMoment,
  formatNumber,
  formatOffset,
  formatTime,
  formatTold,
  groupRegister,
  zoneOffset,
} from './format';

/** Narrow spaces made visible, so that the expected values can be read. */
const seen = (text: string): string => text.replaceAll('\u202f', '_');

describe('registers and numbers', () => {
  it.each([
    ['00000000305', '00_000_000_305'],
    ['305', '305'],
    ['1305', '1_305'],
    ['0004~12', '000_4~12'],
    ['???9~00', '???_9~00'],
    ['', ''],
  ])('groups %s', (register, grouped) => {
    expect(seen(groupRegister(register))).toBe(grouped);
  });

  it.each<[number | bigint, string]>([
    [0, '0'],
    [999, '999'],
    [1000, '1_000'],
    [-15200, '−15_200'],
    [12345678901234567890n, '12_345_678_901_234_567_890'],
  ])('writes %s', (value, written) => {
    expect(seen(formatNumber(value))).toBe(written);
  });

  it('counts in words where words are shorter to read', () => {
    expect([0, 1, 2].map((count) => formatCount(count, 'turn'))).toEqual(['no turns', 'one turn', '2 turns']);
    expect(formatCount(2, 'person', 'people')).toBe('2 people');
  });

  it.each([
    [812, '812 B'],
    [1234, '1.2 kB'],
    [999_949, '999.9 kB'],
    [999_951, '1.0 MB'],
  ])('%i bytes', (bytes, written) => {
    expect(formatBytes(bytes)).toBe(written);
  });
});

describe('times', () => {
  // Berlin changes from summer to winter time on 25 Oct 2026 at 01:00 UTC (last Sunday of October, EU directive 2000/84/EC).
  it.each([
    ['2026-10-25T00:59:59Z', '25 Oct 2026, 02:59 UTC+2', 120],
    ['2026-10-25T01:00:00Z', '25 Oct 2026, 02:00 UTC+1', 60],
    ['2026-12-31T23:30:00Z', '1 Jan 2027, 00:30 UTC+1', 60],
  ])('%s in Berlin', (at, written, offset) => {
    expect(formatMoment(at, 'Europe/Berlin')).toBe(written);
    expect(zoneOffset(at, 'Europe/Berlin')).toBe(offset);
  });

  it('knows zones that are not whole hours away', () => {
    expect(formatMoment('2026-07-01T12:00:00Z', 'America/St_Johns')).toBe('1 July 2026, 09:30 UTC−2:30');
    expect(formatOffset(345)).toBe('UTC+5:45');
  });

  it('writes midnight as 00:00', () => {
    expect(formatTime('2026-11-10T00:00:07Z', 'UTC', true)).toBe('00:00:07');
  });

  it('leaves a date without a time where it is', () => {
    expect(formatDate('2026-11-09')).toBe('9 Nov 2026');
    expect(formatDay(new Date('2026-09-01T00:00:00Z'), 'Pacific/Honolulu')).toBe('31 Aug 2026');
  });

  it('repeats the offset a time was told in', () => {
    expect(formatTold('2026-11-10T08:05:12Z', 60)).toBe('09:05:12 UTC+1');
  });

  it.each([
    [0, '0 s'],
    [89, '89 s'],
    [90, '2 min'],
    [3599, '1 h 00 min'],
    [3900, '1 h 05 min'],
    [273_600, '3 d 4 h'],
  ])('%i seconds', (seconds, written) => {
    expect(formatDuration(seconds)).toBe(written);
  });
});
