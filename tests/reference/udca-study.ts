import { toDayNumber, toIsoDate } from '@/lib/engine/calendar';
import type { Study, Subject } from '@/lib/engine/types';

/** One patient of the UDCA trial as `udca_patients.csv` has it: days from entry to the first endpoint, or to the last visit. */
export interface UdcaPatient {
  id: number;
  entry: number;
  /** Last day: the endpoint's (with `event`) or the last visit's. */
  last: number;
  event: boolean;
}

/**
 * The study file's dates begin in 1990, the trial's in 1988: every date is moved by 28 years, after which the Gregorian calendar
 * repeats itself to the weekday and the leap day. Nothing but the year's name changes.
 */
const MOVED_DAYS = 28 * 365.25;

export function udcaPatients(rows: readonly Record<string, string>[]): UdcaPatient[] {
  return rows.map(({ id = '', entry = '', time = '', status }) => ({
    id: Number(id),
    entry: toDayNumber(entry) + MOVED_DAYS,
    // Half days stand for an end on the day of entry.
    last: toDayNumber(entry) + MOVED_DAYS + Math.floor(Number(time)),
    event: status === '1',
  }));
}

/** Events that had happened by the end of a day. */
export function eventsBy(patients: readonly UdcaPatient[], day: number): number {
  return patients.filter(({ event, last }) => event && last <= day).length;
}

/**
 * The trial as it stood at a data cut-off, made into a study file. Patients who entered later are not in it; an endpoint that came
 * later is not known yet; a patient whose visits had ended without endpoint has withdrawn.
 *
 * The data name no hospitals and no plan. So enrolment is one site from the day of its first patient, the target is the 170
 * patients of the trial, and the plan is a round guess with little weight: a pooled median of 48 months, worth 4 events.
 */
export function buildUdcaStudy(patients: readonly UdcaPatient[], dataCutoff: string): Study {
  const cutoff = toDayNumber(dataCutoff);
  const entered = patients.filter(({ entry }) => entry <= cutoff);
  const firstEntry = Math.min(...entered.map(({ entry }) => entry));
  return {
    format: 'kalends-study/1',
    study: { code: 'UDCA', title: 'Ursodeoxycholic acid in primary biliary cirrhosis, as it stood while enrolling' },
    dataCutoff,
    enrolment: {
      target: patients.length,
      rate: { meanPerMonth: 5, cv: 0.5, basis: 'data' },
      sites: [
        {
          code: '001',
          country: 'US',
          activatedOn: toIsoDate(firstEntry),
          activationIsFirstPatient: true,
          randomised: entered.length,
        },
      ],
    },
    events: {
      model: { family: 'weibull', medianMonths: 48, shape: 1, basis: 'data', priorEvents: 4 },
      dropout: { perMonth: 0.005, basis: 'data', priorEvents: 1 },
      subjects: entered.map((patient) => subjectAt(patient, cutoff)),
    },
    milestones: [
      {
        code: 'E37',
        name: '37th event',
        kind: 'events',
        count: eventsBy(patients, toDayNumber('2019-07-01')),
        plannedOn: '2019-07-01',
      },
      {
        code: 'E57',
        name: '57th event',
        kind: 'events',
        count: eventsBy(patients, toDayNumber('2020-06-30')),
        plannedOn: '2020-06-30',
      },
      { code: 'LPI', name: 'Last patient in', kind: 'randomised', count: patients.length },
    ],
    simulation: { draws: 10_000, seed: 1, horizonMonths: 120 },
  };
}

function subjectAt({ id, entry, last, event }: UdcaPatient, cutoff: number): Subject {
  const over = last <= cutoff;
  return {
    id: String(id).padStart(4, '0'),
    site: '001',
    randomisedOn: toIsoDate(entry),
    status: !over ? 'at-risk' : event ? 'event' : 'withdrawn',
    statusOn: toIsoDate(Math.min(last, cutoff)),
  };
}
