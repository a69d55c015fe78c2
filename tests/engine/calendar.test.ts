import { describe, expect, it } from 'vitest';
import {
  dayOfMoment,
  mondayOf,
  monthEnd,
  monthOrdinal,
  monthStart,
  toDayNumber,
  toIsoDate,
  toMonthOrdinal,
} from '@/lib/engine/calendar';

describe('calendar', () => {
  it('agrees with the calendar of the language on every day from 1990 to 2100', () => {
    const first = Date.UTC(1990, 0, 1) / 86_400_000;
    const last = Date.UTC(2100, 11, 31) / 86_400_000;
    for (let day = first; day <= last; day += 1) {
      const date = new Date(day * 86_400_000);
      const iso = date.toISOString().slice(0, 10);
      if (toIsoDate(day) !== iso || toDayNumber(iso) !== day) throw new Error(`${iso} is not day ${day}.`);
      if (mondayOf(day) !== day - ((date.getUTCDay() + 6) % 7)) throw new Error(`${iso}: wrong Monday.`);
      if (monthOrdinal(day) !== date.getUTCFullYear() * 12 + date.getUTCMonth())
        throw new Error(`${iso}: wrong month.`);
    }
    expect(toIsoDate(first)).toBe('1990-01-01');
  });

  it('knows the ends of months', () => {
    expect(toIsoDate(monthEnd(toMonthOrdinal('2028-02')))).toBe('2028-02-29');
    expect(toIsoDate(monthEnd(toMonthOrdinal('2027-12')))).toBe('2027-12-31');
    expect(toIsoDate(monthStart(toMonthOrdinal('2028-01')))).toBe('2028-01-01');
  });

  it.each(['2027-02-29', '2027-13-01', '2027-00-10', '2027-04-31', '27-01-01', '2027-1-1', 'soon', ''])(
    'refuses “%s”',
    (date) => {
      expect(() => toDayNumber(date)).toThrow(RangeError);
    },
  );

  it('puts a moment t on day cut-off + ceil(t)', () => {
    expect(dayOfMoment(0, 100)).toBe(100);
    expect(dayOfMoment(0.01, 100)).toBe(101);
    expect(dayOfMoment(1, 100)).toBe(101);
    expect(dayOfMoment(-0.5, 100)).toBe(100);
  });
});
