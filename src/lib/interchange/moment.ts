/**
 * Moments as RFC 3339 writes them, read by hand: the core has no clock, and the platform's own parser accepts
 * far more than the standard and forgets the offset.
 */
export interface Moment {
  /** The instant in UTC, always `YYYY-MM-DDThh:mm:ss.mmmZ`; digits finer than a millisecond are cut, not rounded. */
  readonly instant: string;
  /** Minutes that the tester's own clock stood ahead of UTC. */
  readonly offsetMinutes: number;
  /** The text as it came, kept only where `writeMoment` would otherwise spell the same moment differently. */
  readonly written?: string;
}

/** Why a text is no moment: `time-without-offset` where only the offset is missing, `bad-time` for the rest. */
export type MomentRefusal = 'bad-time' | 'time-without-offset';

const RFC3339 =
  /^(\d{4})-(\d{2})-(\d{2})[Tt ](\d{2}):(\d{2}):(\d{2})(?:\.(\d{1,9}))?(?:([Zz])|([+-])(\d{2}):(\d{2}))?$/;
const INSTANT = /^(\d{4})-(\d{2})-(\d{2})T(\d{2}):(\d{2}):(\d{2})\.(\d{3})Z$/;
const MINUTES_A_DAY = 1440;

/**
 * Reads an RFC 3339 date-time. Real calendar days only, hours to 23, seconds to 59 (a leap second has no place in
 * the database's clock either), offsets to ±23:59, years 0001 to 9999 both here and in UTC.
 */
export function readMoment(text: string): Moment | MomentRefusal {
  const match = RFC3339.exec(text);
  if (!match) return 'bad-time';
  const [, y, mo, d, h, mi, s, fraction = '', zulu, sign, oh = '0', om = '0'] = match;
  const [year, month, day, hour, minute] = [y, mo, d, h, mi].map(Number) as [number, number, number, number, number];
  if (year < 1 || month < 1 || month > 12 || day < 1 || day > daysInMonth(year, month)) return 'bad-time';
  if (hour > 23 || minute > 59 || Number(s) > 59 || Number(oh) > 23 || Number(om) > 59) return 'bad-time';
  if (!zulu && !sign) return 'time-without-offset';
  // `|| 0` keeps −00:00 from becoming the number −0, which no comparison of records would survive.
  const offsetMinutes = (sign === '-' ? -1 : 1) * (Number(oh) * 60 + Number(om)) || 0;
  const instant = shiftMinutes({ year, month, day, minutes: hour * 60 + minute }, -offsetMinutes);
  if (instant.year < 1 || instant.year > 9999) return 'bad-time';
  const moment = {
    instant: `${spell(instant)}:${s}.${fraction.padEnd(3, '0').slice(0, 3)}Z`,
    offsetMinutes,
  };
  return writeMoment(moment) === text ? moment : { ...moment, written: text };
}

/**
 * Writes a moment with its own offset: `Z` for none, three digits of fraction or none. A moment that came in another
 * spelling is written as it came.
 * @throws where the instant is not of the form `Moment` promises: a mistake of the caller.
 */
export function writeMoment({ instant, offsetMinutes, written }: Moment): string {
  if (written !== undefined) return written;
  const match = INSTANT.exec(instant);
  if (!match) throw new Error(`Not an instant in UTC with milliseconds: ${instant}`);
  const [, y, mo, d, h, mi, s, ms] = match;
  const utc = {
    year: Number(y),
    month: Number(mo),
    day: Number(d),
    minutes: Number(h) * 60 + Number(mi),
  };
  const ahead = Math.abs(offsetMinutes);
  const offset = `${offsetMinutes < 0 ? '-' : '+'}${two(Math.floor(ahead / 60))}:${two(ahead % 60)}`;
  const local = `${spell(shiftMinutes(utc, offsetMinutes))}:${s}${ms === '000' ? '' : `.${ms}`}`;
  return `${local}${offsetMinutes === 0 ? 'Z' : offset}`;
}

interface CivilMinute {
  readonly year: number;
  readonly month: number;
  readonly day: number;
  /** Minutes since midnight. */
  readonly minutes: number;
}

/** Moves by less than a day either way, so at most one date line is crossed. */
function shiftMinutes(from: CivilMinute, by: number): CivilMinute {
  const minutes = from.minutes + by;
  if (minutes < 0) return { ...dayBefore(from), minutes: minutes + MINUTES_A_DAY };
  if (minutes >= MINUTES_A_DAY) return { ...dayAfter(from), minutes: minutes - MINUTES_A_DAY };
  return { ...from, minutes };
}

function dayBefore({ year, month, day }: CivilMinute): Omit<CivilMinute, 'minutes'> {
  if (day > 1) return { year, month, day: day - 1 };
  return month > 1
    ? { year, month: month - 1, day: daysInMonth(year, month - 1) }
    : { year: year - 1, month: 12, day: 31 };
}

function dayAfter({ year, month, day }: CivilMinute): Omit<CivilMinute, 'minutes'> {
  if (day < daysInMonth(year, month)) return { year, month, day: day + 1 };
  return month < 12 ? { year, month: month + 1, day: 1 } : { year: year + 1, month: 1, day: 1 };
}

function daysInMonth(year: number, month: number): number {
  const leap = year % 4 === 0 && (year % 100 !== 0 || year % 400 === 0);
  if (month === 2) return leap ? 29 : 28;
  return month === 4 || month === 6 || month === 9 || month === 11 ? 30 : 31;
}

function spell({ year, month, day, minutes }: CivilMinute): string {
  const date = `${String(year).padStart(4, '0')}-${two(month)}-${two(day)}`;
  return `${date}T${two(Math.floor(minutes / 60))}:${two(minutes % 60)}`;
}

function two(value: number): string {
  return String(value).padStart(2, '0');
}
