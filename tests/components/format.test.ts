import { describe, expect, it } from 'vitest';
import {
  cautionMark,
  formatCount,
  formatCountRange,
  formatDate,
  formatDateRange,
  formatDaysMoved,
  formatDecimal,
  formatDuration,
  formatInstant,
  formatLongMonth,
  formatMonth,
  formatMonthRange,
  formatOrdinal,
  formatPercent,
  formatProbability,
  formatQuantity,
  formatSigned,
} from '@/lib/format';

describe('dates', () => {
  it('prints a day with its month in letters and no leading nought', () => {
    expect(formatDate('2027-03-14')).toBe('14 Mar 2027');
    expect(formatDate('2027-03-04')).toBe('4 Mar 2027');
  });

  it('refuses what is no calendar date', () => {
    expect(() => formatDate('14/03/2027')).toThrow(RangeError);
    expect(() => formatDate('2027-13-01')).toThrow(RangeError);
  });

  it('prints months short and long, from a month or a day', () => {
    expect(formatMonth('2027-03')).toBe('Mar 2027');
    expect(formatMonth('2027-03-31')).toBe('Mar 2027');
    expect(formatLongMonth('2027-03')).toBe('March 2027');
  });

  it.each([
    ['2026-10-03', '2026-10-23', '3 to 23 Oct 2026'],
    ['2028-06-19', '2028-12-02', '19 Jun to 2 Dec 2028'],
    ['2027-11-23', '2028-02-03', '23 Nov 2027 to 3 Feb 2028'],
    ['2027-11-23', '2027-11-23', '23 Nov 2027'],
  ])('says a shared month or year of %s and %s once', (from, to, text) => {
    expect(formatDateRange(from, to)).toBe(text);
  });

  it.each([
    ['2027-11-23', '2028-02-03', 'Nov 2027 to Feb 2028'],
    ['2028-06-19', '2028-12-02', 'Jun to Dec 2028'],
    ['2027-11-01', '2027-11-28', 'Nov 2027'],
  ])('prints %s to %s in months', (from, to, text) => {
    expect(formatMonthRange(from, to)).toBe(text);
  });

  it('does not invent an end that lies beyond the horizon', () => {
    expect(formatDateRange('2028-06-19', null)).toBe('19 Jun 2028 or later');
    expect(formatMonthRange('2028-06-19', null)).toBe('Jun 2028 or later');
    expect(formatDateRange(null, null)).toBe('not reached');
  });

  it('prints an instant in UTC unless a zone is named', () => {
    expect(formatInstant('2027-03-03T10:12:44Z')).toBe('3 Mar 2027, 10:12');
    expect(formatInstant('2027-03-03T23:30:00Z', 'Europe/Warsaw')).toBe('4 Mar 2027, 00:30');
  });

  it('says which way a date moved', () => {
    expect(formatDaysMoved(16)).toBe('16 days later');
    expect(formatDaysMoved(-1)).toBe('1 day earlier');
    expect(formatDaysMoved(0.3)).toBe('unchanged');
  });
});

describe('numbers', () => {
  it('prints a probability as a whole percentage that is never 0 or 100', () => {
    expect(formatProbability(0)).toBe('<\u00a01\u00a0%');
    expect(formatProbability(0.0099)).toBe('<\u00a01\u00a0%');
    expect(formatProbability(0.01)).toBe('1\u00a0%');
    expect(formatProbability(0.424)).toBe('42\u00a0%');
    expect(formatProbability(0.99)).toBe('99\u00a0%');
    expect(formatProbability(0.9901)).toBe('>\u00a099\u00a0%');
    expect(() => formatProbability(1.2)).toThrow(RangeError);
  });

  it('lets a plain proportion be 0 or 100', () => {
    expect(formatPercent(1)).toBe('100\u00a0%');
    expect(formatPercent(0.004, 1)).toBe('0.4\u00a0%');
  });

  it('groups thousands', () => {
    expect(formatCount(999)).toBe('999');
    expect(formatCount(1200)).toBe('1,200');
    expect(formatCount(1234567)).toBe('1,234,567');
    expect(formatCount(-1200)).toBe('\u22121,200');
    expect(formatCountRange(1045, 1120)).toBe('1,045 to 1,120');
    expect(formatCountRange(7, 7)).toBe('7');
  });

  it('counts things', () => {
    expect(formatQuantity(1, 'event')).toBe('1 event');
    expect(formatQuantity(1200, 'event')).toBe('1,200 events');
    expect([1, 2, 3, 11, 12, 13, 21, 111, 288, 1200].map(formatOrdinal)).toEqual([
      '1st',
      '2nd',
      '3rd',
      '11th',
      '12th',
      '13th',
      '21st',
      '111th',
      '288th',
      '1,200th',
    ]);
  });

  it('signs differences with a real minus', () => {
    expect([16, -3, 0].map(formatSigned)).toEqual(['+16', '\u22123', '0']);
    expect(formatDecimal(-0.001)).toBe('0.00');
    expect(formatDecimal(-1.5, 1)).toBe('\u22121.5');
  });

  it('prints durations', () => {
    expect(formatDuration(4)).toBe('4\u00a0s');
    expect(formatDuration(85)).toBe('1\u00a0min 25\u00a0s');
    expect(formatDuration(120)).toBe('2\u00a0min');
  });
});

it('takes caution marks in the printer’s order, then doubles them', () => {
  expect([0, 1, 2, 3, 4, 5, 9, 10].map(cautionMark)).toEqual(['†', '‡', '§', '¶', '‖', '††', '‖‖', '†††']);
});
