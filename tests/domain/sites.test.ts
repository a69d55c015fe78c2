import { describe, expect, it } from 'vitest';
import { COUNTRY_CODES, countryName, isCountryCode, listCountries } from '@/lib/countries';
import { addMonths, daysApart, lastEndedMonth, monthEnd, monthsApart, monthsFrom } from '@/lib/dates';
import { NOTHING_LOGGED, siteFaults, siteStatus } from '@/lib/sites/rules';
import { addSiteBody, type SiteInput } from '@/lib/sites/schema';

const today = '2027-04-05';
const site: SiteInput = {
  code: '107',
  name: 'Lipowa Kidney Clinic',
  city: 'Poznań',
  country: 'PL',
  plannedEarliest: '2026-03-01',
  plannedLikely: '2026-04-01',
  plannedLatest: '2026-06-30',
  activatedOn: '2026-04-14',
  closedOn: null,
  cap: 40,
};
const faultsOf = (change: Partial<SiteInput>, record = NOTHING_LOGGED) =>
  siteFaults({ ...site, ...change }, record, today);

describe('rules of a site', () => {
  it('passes an ordinary one, and one that opens today', () => {
    expect(faultsOf({})).toEqual([]);
    expect(faultsOf({ activatedOn: today })).toEqual([]);
  });

  it('keeps the window in order and whole', () => {
    expect(faultsOf({ plannedLikely: '2026-02-01', plannedLatest: '2026-01-01' }).map((fault) => fault.field)).toEqual([
      'plannedLikely',
      'plannedLatest',
    ]);
    expect(faultsOf({ plannedLatest: null })).toEqual([
      {
        field: 'plannedLatest',
        detail: 'A window has three days: earliest, likely and latest. Give all three or none.',
      },
    ]);
    expect(faultsOf({ plannedEarliest: '2026-04-01', plannedLatest: '2026-04-01' })).toEqual([]);
  });

  it('needs a window or an activation', () => {
    const none = { plannedEarliest: null, plannedLikely: null, plannedLatest: null };
    expect(faultsOf(none)).toEqual([]);
    expect(faultsOf({ ...none, activatedOn: null })[0]!.field).toBe('plannedLikely');
  });

  it('an activation lies not in the future and not after a logged month', () => {
    expect(faultsOf({ activatedOn: '2027-04-06' })[0]!.detail).toContain('today is 5 Apr 2027');
    const record = { randomised: 2, firstMonth: '2026-04', lastPatientMonth: '2026-05' };
    expect(faultsOf({ activatedOn: '2026-04-30' }, record)).toEqual([]);
    expect(faultsOf({ activatedOn: '2026-05-01' }, record)).toEqual([
      { field: 'activatedOn', detail: 'April 2026 is logged already. Give 30 Apr 2026 or an earlier day.' },
    ]);
    expect(faultsOf({ activatedOn: null }, record)[0]!.field).toBe('activatedOn');
  });

  it('a closure lies not before the activation nor before the last month with a patient', () => {
    const record = { randomised: 2, firstMonth: '2026-04', lastPatientMonth: '2026-09' };
    expect(faultsOf({ closedOn: '2026-04-13' })[0]!.detail).toBe(
      'The site opened on 14 Apr 2026. Give that day or a later one.',
    );
    expect(faultsOf({ closedOn: '2026-08-31' }, record)).toEqual([
      { field: 'closedOn', detail: 'Patients are logged in September 2026. Give 1 Sep 2026 or a later day.' },
    ]);
    expect(faultsOf({ closedOn: '2026-09-01' }, record)).toEqual([]);
    expect(faultsOf({ activatedOn: null, closedOn: '2026-09-01' })[0]!.field).toBe('closedOn');
  });

  it('a cap holds those randomised already', () => {
    const record = { randomised: 23, firstMonth: '2026-04', lastPatientMonth: '2027-03' };
    expect(faultsOf({ cap: 22 }, record)).toEqual([
      { field: 'cap', detail: '23 are randomised here already. A cap is at least 23.' },
    ]);
    expect(faultsOf({ cap: 23 }, record)).toEqual([]);
    expect(faultsOf({ cap: null }, record)).toEqual([]);
  });

  it('status: overdue when the window is over without an activation', () => {
    const waiting = { ...site, activatedOn: null };
    expect(siteStatus(site, today)).toBe('open');
    expect(siteStatus({ ...site, closedOn: '2027-04-04' }, today)).toBe('closed');
    expect(siteStatus({ ...site, closedOn: today }, today)).toBe('open');
    expect(siteStatus(waiting, '2026-06-30')).toBe('to-open');
    expect(siteStatus(waiting, '2026-07-01')).toBe('overdue');
  });

  it('the form refuses unknown fields, countries that are none and codes that make no address', () => {
    expect(addSiteBody.safeParse({ ...site, arm: 'A' }).success).toBe(false);
    expect(addSiteBody.safeParse({ ...site, country: 'XX' }).success).toBe(false);
    expect(addSiteBody.safeParse({ ...site, code: 'a/b' }).success).toBe(false);
    expect(addSiteBody.parse({ ...site, code: ' 107 ', country: 'pl' })).toMatchObject({ code: '107', country: 'PL' });
  });
});

describe('countries', () => {
  it('are the 249 of ISO 3166-1, each once, each with a name', () => {
    expect(COUNTRY_CODES).toHaveLength(249);
    expect(new Set(COUNTRY_CODES).size).toBe(249);
    expect(listCountries().filter(({ code, name }) => code === name)).toEqual([]);
    expect(countryName('PL')).toBe('Poland');
    expect(isCountryCode('UK')).toBe(false);
  });
});

describe('calendar months', () => {
  it('add, count and end over years and leap years', () => {
    expect(addMonths('2026-11', 3)).toBe('2027-02');
    expect(addMonths('2026-01', -1)).toBe('2025-12');
    expect(monthEnd('2028-02')).toBe('2028-02-29');
    expect(monthsApart('2026-11', '2027-02')).toBe(3);
    expect(monthsFrom('2026-12', '2027-01')).toEqual(['2026-12', '2027-01']);
    expect(monthsFrom('2027-02', '2027-01')).toEqual([]);
    expect(lastEndedMonth('2027-01-31')).toBe('2026-12');
    expect(daysApart('2027-03-27', '2027-04-05')).toBe(9);
  });
});
