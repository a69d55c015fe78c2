import { describe, expect, it } from 'vitest';
import fc from 'fast-check';
import { conditionWords, headlineOf, newsWords, ruleSpeaks, type PublishedMilestone } from '@/lib/alerts/rules';
import { addAlertRuleBody } from '@/lib/alerts/schema';
import { addDays } from '@/lib/dates';
import type { MilestoneForecast } from '@/lib/engine/types';
import { fixtureMilestone, reached, shifted } from '@/tests/domain/publications-fixture';

const ia = fixtureMilestone('IA');
const MEDIAN = ia.quantiles['0.5']!;
const published = (number: number, milestone: MilestoneForecast, publishedOn = '2027-04-06'): PublishedMilestone => ({
  number,
  publishedOn,
  milestone,
});

describe('slips', () => {
  const speaks = (days: number, moved: number) =>
    ruleSpeaks(
      { kind: 'slips', days },
      { current: published(2, shifted(ia, moved)), before: [published(1, ia)], lastAlert: null, today: '2027-04-06' },
    );

  it('speaks from the number of days on, later only', () => {
    expect(speaks(14, 13)).toBe(false);
    expect(speaks(14, 14)).toBe(true);
    expect(speaks(14, 200)).toBe(true);
    expect(speaks(14, -30)).toBe(false);
  });

  it('a date that wavers by a day says nothing, however often', () => {
    fc.assert(
      fc.property(fc.array(fc.constantFrom(-1, 0, 1), { minLength: 2, maxLength: 12 }), (moves) => {
        const history = moves.map((days, place) => published(place + 1, shifted(ia, days)));
        const said = history
          .slice(1)
          .filter((current, place) =>
            ruleSpeaks(
              { kind: 'slips', days: 14 },
              { current, before: history.slice(0, place + 1).reverse(), lastAlert: null, today: current.publishedOn },
            ),
          );
        expect(said).toEqual([]);
      }),
    );
  });

  it('is held against the publication before, not against older ones', () => {
    const before = [published(2, shifted(ia, 10)), published(1, ia)];
    const situation = { current: published(3, shifted(ia, 20)), before, lastAlert: null, today: '2027-04-06' };
    expect(ruleSpeaks({ kind: 'slips', days: 14 }, situation)).toBe(false);
  });

  it('a median that is there no more has slipped; the first publication has not', () => {
    const never = { ...ia, quantiles: { ...ia.quantiles, '0.5': null, '0.75': null, '0.9': null } };
    const condition = { kind: 'slips', days: 365 } as const;
    const today = '2027-04-06';
    expect(
      ruleSpeaks(condition, { current: published(2, never), before: [published(1, ia)], lastAlert: null, today }),
    ).toBe(true);
    expect(ruleSpeaks(condition, { current: published(1, never), before: [], lastAlert: null, today })).toBe(false);
    expect(
      ruleSpeaks(condition, { current: published(2, ia), before: [published(1, never)], lastAlert: null, today }),
    ).toBe(false);
  });

  it('a publication is spoken of once', () => {
    const situation = {
      current: published(2, shifted(ia, 30)),
      before: [published(1, ia)],
      lastAlert: 2,
      today: '2027-04-06',
    };
    expect(ruleSpeaks({ kind: 'slips', days: 14 }, situation)).toBe(false);
  });
});

describe('nears', () => {
  const condition = { kind: 'nears', withinWeeks: 8, probability: 0.5 } as const;
  // Half of the draws are there by the median: eight weeks before it, give or take the days of a week, the rule speaks.
  const eightWeeksBefore = addDays(MEDIAN, -56);

  it('speaks as time passes under one and the same publication', () => {
    const on = (today: string) =>
      ruleSpeaks(condition, { current: published(1, ia), before: [], lastAlert: null, today });
    expect(on(addDays(eightWeeksBefore, -8))).toBe(false);
    expect(on(addDays(eightWeeksBefore, 8))).toBe(true);
  });

  it('speaks once, and not again while the milestone stays near', () => {
    const today = addDays(eightWeeksBefore, 20);
    const alerted = published(4, ia, addDays(today, -30));
    for (const wavering of [-3, -1, 0, 1, 3]) {
      const situation = { current: published(5, shifted(ia, wavering), today), before: [alerted], lastAlert: 4, today };
      expect(ruleSpeaks(condition, situation)).toBe(false);
    }
    expect(ruleSpeaks(condition, { current: alerted, before: [], lastAlert: 4, today })).toBe(false);
  });

  it('a day over the edge and back is no news; two weeks and more away and back is', () => {
    const on5 = addDays(eightWeeksBefore, 1);
    const on6 = addDays(on5, 28);
    const said = (slip: number) =>
      ruleSpeaks(condition, {
        current: published(6, ia, on6),
        before: [published(5, shifted(ia, slip), on5), published(4, ia, addDays(on5, -1))],
        lastAlert: 4,
        today: on6,
      });
    expect(said(5)).toBe(false);
    expect(said(60)).toBe(true);
  });

  it('is silent once the milestone is reached', () => {
    const current = published(5, reached(ia, '2027-03-20'));
    expect(ruleSpeaks(condition, { current, before: [], lastAlert: null, today: '2027-04-06' })).toBe(false);
  });
});

describe('reached', () => {
  const there = reached(ia, '2027-03-20');
  const speaks = (before: PublishedMilestone[], lastAlert: number | null, milestone = there) =>
    ruleSpeaks({ kind: 'reached' }, { current: published(9, milestone), before, lastAlert, today: '2027-04-06' });

  it('speaks in the first publication that has the day, and never again', () => {
    expect(speaks([published(8, ia)], null)).toBe(true);
    expect(speaks([], null)).toBe(true);
    expect(speaks([published(8, there)], null)).toBe(false);
    expect(speaks([published(8, ia), published(7, there)], 7)).toBe(false);
    expect(speaks([published(8, ia)], null, ia)).toBe(false);
  });
});

describe('what is said', () => {
  const moved: MilestoneForecast = {
    ...ia,
    quantiles: { ...ia.quantiles, '0.1': '2027-11-23', '0.5': '2027-12-26', '0.9': '2028-02-03' },
  };
  const situation = {
    current: published(5, moved),
    before: [published(4, shifted(moved, -16))],
    lastAlert: null,
    today: '2027-04-06',
  };

  it('carries the news in the subject and the source in the sentence', () => {
    const slips = { kind: 'slips', days: 14 } as const;
    expect(newsWords(slips, situation)).toBe('interim analysis now Nov 2027 to Feb 2028, 16 days later');
    expect(headlineOf(slips, situation)).toBe(
      'Interim analysis now Nov 2027 to Feb 2028, 16 days later than in publication 4 (publication 5, 80\u00a0% range).',
    );
    const there = { ...situation, current: published(5, reached(ia, '2027-03-20')) };
    expect(newsWords({ kind: 'reached' }, there)).toBe('interim analysis reached on 20 Mar 2027');
    expect(newsWords({ kind: 'nears', withinWeeks: 8, probability: 0.5 }, situation)).toMatch(
      /^interim analysis nears, Nov 2027 to Feb 2028: .* chance within 8 weeks$/,
    );
  });

  it('a rule reads as a sentence', () => {
    expect(conditionWords({ kind: 'slips', days: 1 }, 'Interim analysis')).toBe(
      'the interim analysis slips by 1 day or more against the last publication',
    );
    expect(conditionWords({ kind: 'nears', withinWeeks: 8, probability: 0.8 }, 'DMC review')).toBe(
      'the DMC review is within 8 weeks with a chance of 80\u00a0% or more',
    );
  });
});

describe('a rule’s form', () => {
  const body = {
    milestoneCode: 'IA',
    condition: { kind: 'reached' },
    recipients: { roles: ['sponsor'], personIds: [] },
    isActive: true,
  };
  const faults = (change: object) => {
    const parsed = addAlertRuleBody.safeParse({ ...body, ...change });
    return parsed.success ? [] : parsed.error.issues.map((issue) => issue.path.join('/'));
  };
  it('never tells a coordinator, tells somebody, and knows its limits', () => {
    expect(faults({})).toEqual([]);
    expect(faults({ recipients: { roles: ['coordinator'], personIds: [] } })).toEqual(['recipients/roles/0']);
    expect(faults({ recipients: { roles: [], personIds: [] } })).toEqual(['recipients']);
    expect(faults({ condition: { kind: 'slips', days: 0 } })).toEqual(['condition/days']);
    expect(faults({ condition: { kind: 'nears', withinWeeks: 1.5, probability: 1 } }).sort()).toEqual([
      'condition/probability',
      'condition/withinWeeks',
    ]);
    expect(faults({ arm: 'A' })).toEqual(['']);
  });
});
