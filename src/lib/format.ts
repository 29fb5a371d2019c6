/**
 * How numbers, times and registers are written for people: pure, the same on the server and in the page. The
 * words of the site are English, so every format is the English one; zones are the reader's or the workshop's.
 */

/** A narrow space that does not break: between groups of digits, as on a drawing. */
const NARROW = '\u202f';

/** Groups of three from the right, kept together: `00 000 000 305`. Glyphs of a wheel between two stay whole. */
export function groupRegister(register: string): string {
  const glyphs = register.match(/[0-9?]~?/gu) ?? [];
  return glyphs
    .map((glyph, index) => ((glyphs.length - index) % 3 === 0 && index > 0 ? NARROW + glyph : glyph))
    .join('');
}

/** A whole number: `15 200`. Also takes BigInt, for what passes 2^53. */
export function formatNumber(value: number | bigint): string {
  const digits = value.toString();
  const sign = digits.startsWith('-') ? '−' : '';
  return sign + digits.replace('-', '').replace(/\B(?=(?:\d{3})+$)/gu, NARROW);
}

/** A count with its noun: `one turn`, `9 turns`, `no turns`. */
export function formatCount(count: number, one: string, many = `${one}s`): string {
  if (count === 0) return `no ${many}`;
  return count === 1 ? `one ${one}` : `${formatNumber(count)} ${many}`;
}

function partsOf(at: Date, zone: string, options: Intl.DateTimeFormatOptions): Map<string, string> {
  const parts = new Intl.DateTimeFormat('en-GB', { ...options, timeZone: zone, hourCycle: 'h23' }).formatToParts(at);
  return new Map(parts.map(({ type, value }) => [type, value]));
}

// Written out, because ICU releases differ in how they shorten September.
const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'June', 'July', 'Aug', 'Sept', 'Oct', 'Nov', 'Dec'] as const;

type Instant = Date | string;

function dateOf(at: Instant): Date {
  return typeof at === 'string' ? new Date(at) : at;
}

/** A day in a zone: `10 Nov 2026`. */
export function formatDay(at: Instant, zone: string): string {
  const parts = partsOf(dateOf(at), zone, { year: 'numeric', month: 'numeric', day: 'numeric' });
  return `${Number(parts.get('day'))} ${MONTHS[Number(parts.get('month')) - 1]} ${parts.get('year')}`;
}

/** A date without a time, as stored (`2026-11-09`): it belongs to no zone and is not shifted into one. */
export function formatDate(date: string): string {
  return formatDay(`${date.slice(0, 10)}T12:00:00Z`, 'UTC');
}

/** A time of day in a zone: `09:05`, or with seconds `09:05:12`. */
export function formatTime(at: Instant, zone: string, seconds = false): string {
  const parts = partsOf(dateOf(at), zone, { hour: '2-digit', minute: '2-digit', second: '2-digit' });
  const clock = `${parts.get('hour')}:${parts.get('minute')}`;
  return seconds ? `${clock}:${parts.get('second')}` : clock;
}

/** Minutes east of UTC that a zone stands at, at an instant. */
export function zoneOffset(at: Instant, zone: string): number {
  const date = dateOf(at);
  const parts = partsOf(date, zone, {
    year: 'numeric',
    month: 'numeric',
    day: 'numeric',
    hour: 'numeric',
    minute: 'numeric',
    second: 'numeric',
  });
  const field = (name: string): number => Number(parts.get(name));
  const there = Date.UTC(
    field('year'),
    field('month') - 1,
    field('day'),
    field('hour'),
    field('minute'),
    field('second'),
  );
  return Math.round((there - date.getTime()) / 60_000);
}

/** An offset from UTC: `UTC+1`, `UTC−3:30`, `UTC`. */
export function formatOffset(minutes: number): string {
  if (minutes === 0) return 'UTC';
  const size = Math.abs(minutes);
  const rest = size % 60;
  return `UTC${minutes < 0 ? '−' : '+'}${Math.floor(size / 60)}${rest === 0 ? '' : `:${String(rest).padStart(2, '0')}`}`;
}

/** An instant in a zone, with the zone's offset so that nobody has to guess: `10 Nov 2026, 09:05 UTC+1`. */
export function formatMoment(at: Instant, zone: string): string {
  return `${formatDay(at, zone)}, ${formatTime(at, zone)} ${formatOffset(zoneOffset(at, zone))}`;
}

/** An instant at an offset in minutes, as it was told: `09:05:12 UTC+1`. */
export function formatTold(at: Instant, offset: number): string {
  const shifted = new Date(dateOf(at).getTime() + offset * 60_000);
  return `${formatTime(shifted, 'UTC', true)} ${formatOffset(offset)}`;
}

/** A length of time: `45 s`, `12 min`, `1 h 05 min`, `3 d 4 h`. Seconds in, never negative. */
export function formatDuration(seconds: number): string {
  const whole = Math.max(0, Math.round(seconds));
  if (whole < 90) return `${whole} s`;
  const minutes = Math.round(whole / 60);
  if (minutes < 60) return `${minutes} min`;
  const hours = Math.floor(minutes / 60);
  if (hours < 48) return `${hours} h ${String(minutes % 60).padStart(2, '0')} min`;
  return `${Math.floor(hours / 24)} d ${hours % 24} h`;
}

/** Bytes: `812 B`, `1.2 kB`, `3.4 MB`; a kB is 1000 bytes. */
export function formatBytes(bytes: number): string {
  if (bytes < 1000) return `${bytes} B`;
  const [size, unit] = bytes < 999_950 ? [bytes / 1000, 'kB'] : [bytes / 1_000_000, 'MB'];
  return `${size.toFixed(1)} ${unit}`;
}
