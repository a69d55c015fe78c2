import { monthEnd, monthOf } from '../dates';
import { formatDate, formatLongMonth } from '../format';
import type { SiteField, SiteInput, SiteStatus } from './schema';

/** What a site's log holds, as far as changing the site depends on it. */
export interface SiteRecord {
  randomised: number;
  /** First month with anything logged. */
  firstMonth: string | null;
  /** Last month with a patient screened or randomised. */
  lastPatientMonth: string | null;
}

export const NOTHING_LOGGED: SiteRecord = { randomised: 0, firstMonth: null, lastPatientMonth: null };

export interface SiteFault {
  field: SiteField;
  detail: string;
}

interface Dated {
  plannedLatest: string | null;
  activatedOn: string | null;
  closedOn: string | null;
}

/** A window that ended before today without an activation is overdue. */
export function siteStatus(site: Dated, today: string): SiteStatus {
  if (site.closedOn && site.closedOn < today) return 'closed';
  if (site.activatedOn) return 'open';
  return site.plannedLatest && site.plannedLatest < today ? 'overdue' : 'to-open';
}

/** Every rule that a site breaks, at once, each at the field that puts it right. */
export function siteFaults(site: SiteInput, record: SiteRecord, today: string): SiteFault[] {
  return [
    ...windowFaults(site),
    ...activationFaults(site, record, today),
    ...closureFaults(site, record),
    ...capFaults(site, record),
  ];
}

function windowFaults({ plannedEarliest, plannedLikely, plannedLatest, activatedOn }: SiteInput): SiteFault[] {
  const window = { plannedEarliest, plannedLikely, plannedLatest };
  const missing = (Object.keys(window) as (keyof typeof window)[]).filter((field) => window[field] === null);
  if (missing.length === 3) {
    return activatedOn
      ? []
      : [{ field: 'plannedLikely', detail: 'Give the planned window, or the day of activation if the site is open.' }];
  }
  if (missing.length > 0)
    return missing.map((field) => ({
      field,
      detail: 'A window has three days: earliest, likely and latest. Give all three or none.',
    }));
  const faults: SiteFault[] = [];
  if (plannedLikely! < plannedEarliest!)
    faults.push({
      field: 'plannedLikely',
      detail: `The likely day lies before the earliest, ${formatDate(plannedEarliest!)}. Give that day or a later one.`,
    });
  if (plannedLatest! < plannedLikely!)
    faults.push({
      field: 'plannedLatest',
      detail: `The latest day lies before the likely one, ${formatDate(plannedLikely!)}. Give that day or a later one.`,
    });
  return faults;
}

function activationFaults({ activatedOn }: SiteInput, { firstMonth }: SiteRecord, today: string): SiteFault[] {
  if (!activatedOn) {
    return firstMonth
      ? [
          {
            field: 'activatedOn',
            detail: `${formatLongMonth(firstMonth)} is logged already, so the site was open then. Give the day of activation.`,
          },
        ]
      : [];
  }
  if (activatedOn > today)
    return [
      {
        field: 'activatedOn',
        detail: `An activation is a day that has come: today is ${formatDate(today)}. Until then give the planned window.`,
      },
    ];
  if (firstMonth && activatedOn > monthEnd(firstMonth)) {
    return [
      {
        field: 'activatedOn',
        detail: `${formatLongMonth(firstMonth)} is logged already. Give ${formatDate(monthEnd(firstMonth))} or an earlier day.`,
      },
    ];
  }
  return [];
}

function closureFaults({ activatedOn, closedOn }: SiteInput, { lastPatientMonth }: SiteRecord): SiteFault[] {
  if (!closedOn) return [];
  if (!activatedOn)
    return [
      {
        field: 'closedOn',
        detail: 'A site that never opened can’t close. Give the day of activation, or leave this empty.',
      },
    ];
  if (closedOn < activatedOn)
    return [
      { field: 'closedOn', detail: `The site opened on ${formatDate(activatedOn)}. Give that day or a later one.` },
    ];
  if (lastPatientMonth && monthOf(closedOn) < lastPatientMonth) {
    return [
      {
        field: 'closedOn',
        detail: `Patients are logged in ${formatLongMonth(lastPatientMonth)}. Give ${formatDate(`${lastPatientMonth}-01`)} or a later day.`,
      },
    ];
  }
  return [];
}

function capFaults({ cap }: SiteInput, { randomised }: SiteRecord): SiteFault[] {
  if (cap === null || cap >= randomised) return [];
  return [{ field: 'cap', detail: `${randomised} are randomised here already. A cap is at least ${randomised}.` }];
}
