import { describe, expect, it } from 'vitest';
import { placePaste } from '@/components/site-log/paste-block';
import {
  countsInWords,
  dueWords,
  figureFault,
  figuresOf,
  monthsWithTyped,
  saveWords,
  stillEmpty,
  typedFaults,
  typedMonths,
} from '@/components/site-log/sheet-figures';
import { monthState, NO_COUNTS } from '@/lib/site-log/rules';
import type { MonthCounts, MonthEntry } from '@/lib/site-log/schema';

const entry = (month: string, counts: Partial<MonthCounts> = {}): MonthEntry => {
  const all = { ...NO_COUNTS, ...counts };
  const state = monthState(all);
  return {
    month,
    state,
    ...all,
    version: state === 'missing' ? null : 1,
    loggedAt: null,
    loggedBy: null,
    revisions: [],
  };
};
const april = entry('2026-04', { screened: 6, failed: 1, randomised: 3, events: 0, withdrawn: 0 });
const months = [april, entry('2026-05'), entry('2026-06', { screened: 4 }), entry('2026-07')];
const site = { activatedOn: '2026-04-14', closedOn: null, cap: 40 };

describe('a figure as typed', () => {
  it('is a whole number, or is asked back with what would be right', () => {
    expect(figureFault(' 12 ')).toBeNull();
    expect(figureFault('3,0')).toBe('“3,0”. Whole numbers only: 3 or 30?');
    expect(figureFault('1.234')).toBe('“1.234”. Whole numbers only: 1.234 or 1234?');
    expect(figureFault('-1')).toBe('A count is not below 0.');
    expect(figureFault('two')).toBe('“two” is not a whole number.');
    expect(figureFault('10001')).toMatch(/at most 10,000/);
    expect(figuresOf({ screened: '5', failed: '', randomised: 'x', events: ' 0' })).toEqual({ screened: 5, events: 0 });
  });

  it('is judged with all that is typed in other months, cell by cell', () => {
    expect(typedFaults(months, { '2026-05': { screened: '0', failed: '9', events: '1,5' } }, site)).toEqual({
      '2026-05/events': '“1,5”. Whole numbers only: 1.5 or 15?',
      '2026-05/failed':
        'That makes 10 failed and 3 randomised since opening, of 6 screened. At most 2 can have failed in May 2026.',
    });
    // The patients of June were screened in May, which is typed in the same go.
    const both = {
      '2026-05': { screened: '9', failed: '0', randomised: '0', events: '0', withdrawn: '0' },
      '2026-06': { failed: '0', randomised: '8' },
    };
    expect(typedFaults(months, both, site)).toEqual({});
    expect(typedFaults(months, { '2026-06': both['2026-06'] }, site)).not.toEqual({});
  });

  it('counts once it is filled; an untouched month stays a gap', () => {
    expect(
      typedMonths({ '2026-07': { screened: '1' }, '2026-05': { failed: ' ' }, '2026-06': { events: '0' } }),
    ).toEqual(['2026-06', '2026-07']);
    expect(monthsWithTyped(months, {}).map((one) => one.month)).toEqual(['2026-04', '2026-06']);
  });
});

describe('a pasted block', () => {
  it('fills cells to the right and down, month by month', () => {
    const placed = placePaste('4\t1\n\t0\t2\r\n', { month: '2026-05', field: 'screened' }, months);
    expect(placed).toEqual({
      rows: 2,
      columns: 3,
      cells: [
        { month: '2026-05', field: 'screened', text: '4' },
        { month: '2026-05', field: 'failed', text: '1' },
        { month: '2026-06', field: 'failed', text: '0' },
        { month: '2026-06', field: 'randomised', text: '2' },
      ],
      refused: [],
    });
  });

  it('says what it did not take, and why', () => {
    const placed = placePaste('7\t3,0\t9\n1\t2\t3\n5', { month: '2026-06', field: 'events' }, months);
    expect(placed.cells).toEqual([
      { month: '2026-06', field: 'events', text: '7' },
      { month: '2026-07', field: 'events', text: '1' },
      { month: '2026-07', field: 'withdrawn', text: '2' },
    ]);
    expect(placed.refused).toEqual([
      'Column 3 lies right of Withdrawn, the last column.',
      'June 2026, Withdrawn: “3,0”. Whole numbers only: 3 or 30?',
      'A row below July 2026: that month can’t be logged yet.',
    ]);
  });

  it('never overwrites what is saved, and passes over what is the same', () => {
    const placed = placePaste('6\t2', { month: '2026-04', field: 'screened' }, months);
    expect(placed.cells).toEqual([]);
    expect(placed.refused).toEqual(['April 2026, Failed: 2. It is saved as 1; correct it, with a reason.']);
  });

  it('follows a head, months included, and never takes a column for treatment', () => {
    const placed = placePaste(
      'Month;ARM;Randomized;Dose notes\nJul 2026;A;2;x\n2026-05;B;1;y\nMay 2031;B;1;y',
      { month: '2026-05', field: 'screened' },
      months,
    );
    expect(placed.cells).toEqual([
      { month: '2026-07', field: 'randomised', text: '2' },
      { month: '2026-05', field: 'randomised', text: '1' },
    ]);
    expect(placed.refused).toEqual([
      'Column 2, “ARM”. Treatment is never stored here; leave that column out.',
      'Column 4, “Dose notes”, is not a column of this sheet.',
      '“May 2031” is not a month of this sheet.',
    ]);
  });
});

describe('what the sheet says', () => {
  it('was saved, is still empty, is due', () => {
    const counts = { ...NO_COUNTS, screened: 5, failed: 1, randomised: 3, events: 1 };
    expect(countsInWords(counts)).toBe('5 screened, 1 failed, 3 randomised, 1 event');
    expect(stillEmpty(counts)).toBe('Withdrawn is still empty.');
    expect(stillEmpty({ ...counts, failed: null, events: null })).toBe('Failed, events and withdrawn are still empty.');
    expect(stillEmpty({ ...counts, withdrawn: 0 })).toBe('');
    expect(dueWords('2027-04-07')).toBe('Wed 7 Apr');
  });

  it('would be saved', () => {
    expect(saveWords(['2026-11', '2027-03'], '2027-04-02')).toBe('Save November 2026 and March');
    expect(saveWords(['2026-05', '2026-06', '2026-07'], '2026-08-01')).toBe('Save 3 months');
  });
});
