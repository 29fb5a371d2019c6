import type { RunMoment } from '@/lib/schemas/run-shapes';

/** The time of day on the tester's own clock: `09:05:12`. */
export function clockWords({ instant, offsetMinutes }: RunMoment): string {
  return new Date(Date.parse(instant) + offsetMinutes * 60_000).toISOString().slice(11, 19);
}

/** Day and minute as the calendar of a zone shows them: `1 Dec 2026, 14:05`. */
export function minuteWords(iso: string, zone: string): string {
  const style = {
    dateStyle: 'medium',
    timeStyle: 'short',
    timeZone: zone,
  } as const;
  return new Intl.DateTimeFormat('en-GB', style).format(new Date(iso));
}

/** This moment, with the offset of the clock of this device. */
export function momentNow(now: Date = new Date()): RunMoment {
  return {
    instant: now.toISOString(),
    offsetMinutes: -now.getTimezoneOffset() || 0,
  };
}
