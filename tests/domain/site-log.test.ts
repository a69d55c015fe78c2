import { describe, expect, it } from 'vitest';
import {
  countFaults,
  dueOn,
  loggableMonths,
  type LoggedMonth,
  monthFault,
  monthState,
  NO_COUNTS,
  runningMonth,
  totalsOf,
} from '@/lib/site-log/rules';
import type { MonthCounts } from '@/lib/site-log/schema';

const site = { activatedOn: '2026-04-14', closedOn: null, cap: 40 };
const row = (month: string, counts: Partial<MonthCounts>): LoggedMonth => ({ month, ...NO_COUNTS, ...counts });
const full = (
  month: string,
  [screened, failed, randomised, events, withdrawn]: [number, number, number, number, number],
): LoggedMonth => ({ month, screened, failed, randomised, events, withdrawn });

const ledger = [full('2026-04', [6, 1, 3, 0, 0]), full('2026-05', [4, 1, 2, 1, 0])];
/** The faults of saving this row into the ledger. */
function saving(saved: LoggedMonth, before: LoggedMonth[] = ledger, cap: number | null = 40) {
  return countFaults(before, [...before.filter((one) => one.month !== saved.month), saved], saved.month, {
    ...site,
    cap,
  });
}

describe('which months can be logged', () => {
  it('from the month of the activation to the last month that is over', () => {
    expect(loggableMonths(site, '2026-07-01')).toEqual(['2026-04', '2026-05', '2026-06']);
    expect(loggableMonths(site, '2026-06-30')).toEqual(['2026-04', '2026-05']);
    expect(loggableMonths(site, '2026-04-30')).toEqual([]);
    expect(runningMonth(site, '2026-06-30')).toBe('2026-06');
  });

  it('up to the month of the closure, and none before an activation', () => {
    expect(loggableMonths({ ...site, closedOn: '2026-05-02' }, '2026-12-01')).toEqual(['2026-04', '2026-05']);
    expect(loggableMonths({ ...site, activatedOn: null }, '2026-12-01')).toEqual([]);
    expect(runningMonth({ ...site, closedOn: '2026-05-02' }, '2026-12-01')).toBeNull();
    expect(runningMonth({ ...site, activatedOn: null }, '2026-12-01')).toBeNull();
  });

  it('says why a month can’t be logged, and what could', () => {
    expect(monthFault(site, '2026-03', '2026-12-01')).toBe(
      'The site opened on 14 Apr 2026. Log April 2026 and later months.',
    );
    expect(monthFault(site, '2026-12', '2026-12-31')).toBe(
      'December 2026 is not over yet. It can be logged from 1 Jan 2027.',
    );
    expect(monthFault({ ...site, closedOn: '2026-05-02' }, '2026-06', '2026-12-01')).toBe(
      'The site closed on 2 May 2026. Log months up to May 2026.',
    );
    expect(monthFault({ ...site, activatedOn: null }, '2026-06', '2026-12-01')).toMatch(/not been activated/);
    expect(monthFault(site, '2026-11', '2026-12-01')).toBeNull();
  });

  it('is due on the seventh of the next month, over the turn of the year too', () => {
    expect(dueOn('2026-12')).toBe('2027-01-07');
  });
});

describe('the state of a month', () => {
  it('tells nought, empty and not logged apart', () => {
    expect(monthState(NO_COUNTS)).toBe('missing');
    expect(monthState({ ...NO_COUNTS, events: 0 })).toBe('incomplete');
    expect(monthState({ screened: 0, failed: 0, randomised: 0, events: 0, withdrawn: 0 })).toBe('reported');
  });

  it('sums what is logged only', () => {
    expect(totalsOf([row('2026-04', { screened: 3 }), row('2026-06', { screened: 2, failed: 1 })])).toEqual({
      screened: 5,
      failed: 1,
      randomised: 0,
      events: 0,
      withdrawn: 0,
    });
  });
});

describe('figures that can’t exceed others since the site opened', () => {
  it('passes what fits exactly', () => {
    // 10 screened, 2 failed, 5 randomised so far: 3 in screening.
    expect(saving(full('2026-06', [0, 1, 2, 0, 0]))).toEqual([]);
  });

  it('failed and randomised together: of those screened, with what would be right', () => {
    expect(saving(full('2026-06', [0, 4, 0, 0, 0]))).toEqual([
      {
        field: 'failed',
        detail:
          'That makes 6 failed and 5 randomised since opening, of 10 screened. At most 3 can have failed in June 2026.',
      },
    ]);
    expect(saving(full('2026-06', [0, 0, 4, 0, 0]))).toEqual([
      {
        field: 'randomised',
        detail:
          'That makes 2 failed and 9 randomised since opening, of 10 screened. At most 3 can have been randomised in June 2026.',
      },
    ]);
  });

  it('events and withdrawals, each and together: of those randomised', () => {
    expect(saving(full('2026-06', [0, 0, 0, 5, 0]))[0]!.detail).toBe(
      'That makes 6 with an event and 0 withdrawn since opening, of 5 randomised. At most 4 can have had an event in June 2026.',
    );
    expect(saving(full('2026-06', [0, 0, 0, 0, 6]))[0]!.field).toBe('withdrawn');
    expect(saving(full('2026-06', [0, 0, 0, 2, 2]))).toEqual([]);
    expect(saving(full('2026-06', [0, 0, 0, 3, 2]))).toHaveLength(1);
  });

  it('randomised: the cap', () => {
    expect(saving(full('2026-06', [9, 0, 2, 0, 0]), ledger, 6)).toEqual([
      {
        field: 'randomised',
        detail:
          'That makes 7 randomised since opening; the site’s cap is 6. At most 1 can have been randomised in June 2026.',
      },
    ]);
    expect(saving(full('2026-06', [9, 0, 9, 0, 0]), ledger, null)).toEqual([]);
  });

  it('reports every broken limit at once', () => {
    expect(saving(full('2026-06', [0, 9, 0, 9, 0])).map((fault) => fault.field)).toEqual(['failed', 'events']);
  });

  it('does not judge by a figure that is still empty, and judges when it comes', () => {
    const partial = row('2026-06', { randomised: 4 });
    expect(saving(partial)).toEqual([]);
    expect(saving({ ...partial, screened: 0 }, [...ledger, partial])).toEqual([
      {
        field: 'screened',
        detail:
          'That makes 2 failed and 9 randomised since opening, of 10 screened. At least 1 were screened in June 2026, then.',
      },
    ]);
  });

  it('a month that is not logged is a gap: the sum leaves it out and the sentence names it', () => {
    const [fault] = saving(full('2026-07', [0, 0, 4, 0, 0]));
    expect(fault!.detail).toContain('June 2026 is not logged: log it first if they were screened then.');
  });

  it('a correction of an early month is judged at the later month-ends', () => {
    const later = [...ledger, full('2026-06', [0, 0, 3, 0, 0])];
    expect(saving(full('2026-04', [5, 1, 3, 0, 0]), later)).toEqual([
      {
        field: 'screened',
        detail:
          'That makes 2 failed and 8 randomised by Jun 2026, of 9 screened. At least 6 were screened in April 2026, then.',
      },
    ]);
  });

  it('an older flaw elsewhere does not lock the sheet, unless it gets worse', () => {
    const flawed = [full('2026-04', [1, 0, 3, 0, 0])];
    expect(saving(full('2026-05', [0, 0, 0, 0, 0]), flawed)).toEqual([]);
    expect(saving(full('2026-05', [1, 0, 0, 0, 0]), flawed)).toEqual([]);
    expect(saving(full('2026-05', [0, 0, 1, 0, 0]), flawed)).toHaveLength(1);
  });
});
