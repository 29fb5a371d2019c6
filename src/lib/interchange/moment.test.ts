import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readMoment, writeMoment } from './moment';

describe('readMoment', () => {
  it.each([
    // RFC 3339, section 5.8, the examples that are not leap seconds.
    ['1985-04-12T23:20:50.52Z', '1985-04-12T23:20:50.520Z', 0],
    ['1996-12-19T16:39:57-08:00', '1996-12-20T00:39:57.000Z', -480],
    ['1937-01-01T12:00:27.87+00:20', '1937-01-01T11:40:27.870Z', 20],
    ['2024-02-29T00:10:00+01:00', '2024-02-28T23:10:00.000Z', 60],
    ['2000-03-01T00:00:00+00:01', '2000-02-29T23:59:00.000Z', 1],
    ['1900-02-28T23:59:59-00:01', '1900-03-01T00:00:59.000Z', -1],
    ['2026-12-31T23:59:59-23:59', '2027-01-01T23:58:59.000Z', -1439],
    ['2026-01-01t00:00:00z', '2026-01-01T00:00:00.000Z', 0],
    ['2026-01-01 00:00:00-00:00', '2026-01-01T00:00:00.000Z', 0],
  ])('reads %s', (text, instant, offsetMinutes) => {
    expect(readMoment(text)).toMatchObject({ instant, offsetMinutes });
  });

  it.each([
    'yesterday',
    '2026-02-29T10:00:00Z',
    '1900-02-29T10:00:00Z',
    '2026-04-31T10:00:00Z',
    '2026-13-01T10:00:00Z',
    '2026-00-10T10:00:00Z',
    '2026-01-00T10:00:00Z',
    '2026-01-01T24:00:00Z',
    '2026-01-01T10:60:00Z',
    '2026-01-01T10:00:60Z',
    '2026-01-01T10:00:00+24:00',
    '2026-01-01T10:00:00+01:60',
    '2026-01-01T10:00:00+0100',
    '2026-01-01T10:00Z',
    '2026-01-01T10:00:00.Z',
    '0000-01-01T10:00:00Z',
    '0001-01-01T00:00:00+00:01',
    '9999-12-31T23:59:59-00:01',
    '14/03/2026 09:13',
    '２026-01-01T10:00:00Z',
  ])('refuses %s', (text) => {
    expect(readMoment(text)).toBe('bad-time');
  });

  it('says when only the offset is missing', () => {
    expect(readMoment('2026-03-14T09:13:20')).toBe('time-without-offset');
    expect(readMoment('2026-03-14T09:13:20.5')).toBe('time-without-offset');
  });

  it('keeps the spelling only where its own would differ', () => {
    expect(readMoment('2026-03-14T09:13:20+01:00')).not.toHaveProperty('written');
    expect(readMoment('2026-03-14T09:13:20.125Z')).not.toHaveProperty('written');
    for (const text of ['2026-03-14T09:13:20.000Z', '2026-03-14T09:13:20+00:00', '2026-03-14T09:13:20.123456Z'])
      expect(readMoment(text)).toHaveProperty('written', text);
  });

  it('agrees with the platform on every instant and offset, and writes back what it read', () => {
    const instants = fc.date({
      min: new Date('0001-01-03T00:00:00Z'),
      max: new Date('9999-12-29T00:00:00Z'),
      noInvalidDate: true,
    });
    fc.assert(
      fc.property(instants, fc.integer({ min: -1439, max: 1439 }), (date, offsetMinutes) => {
        const instant = date.toISOString();
        const text = writeMoment({ instant, offsetMinutes });
        expect(Date.parse(text)).toBe(date.getTime());
        expect(readMoment(text)).toEqual({ instant, offsetMinutes });
      }),
      { numRuns: 2000 },
    );
  });

  it('reads any text without throwing, and what it accepts it gives back letter for letter', () => {
    const nearly = fc.stringMatching(
      /^\d{4}-[01]\d-[0-3]\d[Tt ][0-2]\d:[0-6]\d:[0-6]\d(\.\d{1,9})?([Zz]|[+-][0-2]\d:[0-6]\d)?$/,
    );
    fc.assert(
      fc.property(fc.oneof(nearly, fc.string()), (text) => {
        const moment = readMoment(text);
        if (typeof moment !== 'string') {
          expect(writeMoment(moment)).toBe(text);
          const cut = text.replace(' ', 'T').replace(/(\.\d{3})\d+/, '$1');
          expect(Date.parse(cut)).toBe(Date.parse(moment.instant));
        }
      }),
      { numRuns: 3000 },
    );
  });
});

describe('writeMoment', () => {
  it('does not write what is no instant', () => {
    expect(() => writeMoment({ instant: '2026-03-14T09:13:20Z', offsetMinutes: 0 })).toThrow();
  });
});
