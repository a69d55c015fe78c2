/** The only source of the current instant. A replayed history and the tests bring their own. */
export interface Clock {
  now(): Date;
}

export const systemClock: Clock = { now: () => new Date() };

export function fixedClock(instant: string): Clock {
  return { now: () => new Date(instant) };
}

/** The calendar day of an instant, in UTC: the day that rules about "today" and "the future" go by. */
export function calendarDay(instant: Date): string {
  return instant.toISOString().slice(0, 10);
}
