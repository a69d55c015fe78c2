import { describe, expect, it } from 'vitest';
import { numberTyped } from '@/components/ui/number-typed';
import { readTypedDate } from '@/components/ui/typed-date';

describe('a typed date', () => {
  it.each([
    ['2027-03-14', '2027-03-14'],
    ['2027/3/4', '2027-03-04'],
    ['14 Mar 2027', '2027-03-14'],
    ['14 march 27', '2027-03-14'],
    ['14-Mar-2027', '2027-03-14'],
    ['14mar2027', '2027-03-14'],
    ['1st Sept 2027', '2027-09-01'],
    ['Mar 14, 2027', '2027-03-14'],
    ['14/03/2027', '2027-03-14'],
    ['03/14/2027', '2027-03-14'],
    ['04/04/27', '2027-04-04'],
    ['29 Feb 2028', '2028-02-29'],
  ])('%s is %s', (typed, iso) => expect(readTypedDate(typed)).toEqual({ kind: 'date', iso }));

  it.each(['03/04/27', '3.4.2027', '03-04-27'])('%s is asked back with both readings', (typed) =>
    expect(readTypedDate(typed)).toEqual({ kind: 'ambiguous', readings: ['2027-04-03', '2027-03-04'] }),
  );

  it.each(['29 Feb 2027', '31/31/2027', 'soon', '14 Foo 2027', '2027-13-01', '14 Mar'])('%s is no date', (typed) =>
    expect(readTypedDate(typed)).toEqual({ kind: 'unreadable' }),
  );

  it('is empty where nothing is typed', () => expect(readTypedDate('  ')).toEqual({ kind: 'empty' }));
});

describe('a typed number', () => {
  it.each([
    ['1.60', 1.6],
    ['1,200', 1200],
    ['1 200 000', 1200000],
    ['\u22123', -3],
    ['.5', 0.5],
  ])('%s is %d', (typed, value) => expect(numberTyped(typed)).toBe(value));

  it('keeps empty apart from nought', () => {
    expect(numberTyped('')).toBeNull();
    expect(numberTyped('0')).toBe(0);
  });

  it.each(['three', '1,2', '1e3', '--1', '3.0.1'])('%s is no number', (typed) => expect(numberTyped(typed)).toBeNaN());
});
