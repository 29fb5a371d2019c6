/** A day as people write it, in the workshop's zone. */
export function dayIn(zone: string, instant: string | Date): string {
  return new Intl.DateTimeFormat('en-GB', { dateStyle: 'medium', timeZone: zone }).format(new Date(instant));
}

/** Day and minute, in the workshop's zone. */
export function minuteIn(zone: string, instant: string | Date): string {
  const style = { dateStyle: 'medium', timeStyle: 'short', timeZone: zone } as const;
  return new Intl.DateTimeFormat('en-GB', style).format(new Date(instant));
}
