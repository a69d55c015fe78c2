import { addDays, addMonths, monthEnd, monthOf, monthsFrom } from '@/lib/dates';
import { FAMILY_NAMES, FIRST_NAMES } from './names';
import { PLACES } from './places';
import { DemoRandom } from './random';
import type { Subject } from '@/lib/engine/types';

export interface DemoSite {
  code: string;
  name: string;
  city: string;
  country: string;
  coordinator: string;
  /** The window as first planned, and as re-planned where the country came late. */
  planned: [string, string, string];
  replanned: [string, string, string] | null;
  activatedOn: string | null;
  cap: number;
}

export interface DemoSubject {
  id: string;
  site: string;
  randomisedOn: string;
  eventOn: string | null;
  withdrawnOn: string | null;
}

export interface DemoMonth {
  site: string;
  month: string;
  counts: { screened: number; failed: number; randomised: number; events: number; withdrawn: number };
  /** First typed wrong by one, put right a few weeks later. */
  firstTyped: { screened: number } | null;
}

export interface DemoTrial {
  /** The first and the last month that is over. */
  months: string[];
  sites: DemoSite[];
  subjects: DemoSubject[];
  log: DemoMonth[];
}

interface Shape {
  seed: number;
  lastMonth: string;
  monthsIn: number;
  meanPerMonth: number;
  medianMonths: number;
  lossPerMonth: number;
}

const DAYS_PER_MONTH = 365.25 / 12;
const DAY_MS = 86_400_000;

const toDay = (iso: string): number => Date.parse(iso) / DAY_MS;
const toIso = (day: number): string => new Date(day * DAY_MS).toISOString().slice(0, 10);

/** The invented trial: what its sites and patients did up to the end of the last month. The same seed and month give the same trial. */
export function generateTrial(shape: Shape): DemoTrial {
  const random = new DemoRandom(shape.seed);
  const first = addMonths(shape.lastMonth, 1 - shape.monthsIn);
  const months = monthsFrom(first, shape.lastMonth);
  const sites = makeSites(random, first, shape.lastMonth);
  const subjects = sites.flatMap((site) => (site.activatedOn ? makeSubjects(random, site, shape) : []));
  return { months, sites, subjects, log: sites.flatMap((site) => makeLog(random, site, subjects, shape.lastMonth)) };
}

function makeSites(random: DemoRandom, first: string, lastMonth: string): DemoSite[] {
  const start = toDay(`${first}-01`);
  const end = toDay(monthEnd(lastMonth));
  return PLACES.flatMap(({ country, first: firstCode, clinics }, order) =>
    clinics.map(([name, city], index): DemoSite => {
      const late = country === 'PT' || country === 'RO';
      const likely = start + 20 + order * 14 + index * 12 + random.between(-6, 6);
      const planned: [string, string, string] = [toIso(likely - 14), toIso(likely), toIso(likely + 35)];
      const delay = late ? 255 + random.between(0, 30) : random.between(-8, 34);
      const opens = likely + delay;
      const overdue = country === 'RO' && index === 3;
      const replannedLikely = Math.max(opens, end + 20 + index * 16);
      const replanned: DemoSite['replanned'] = overdue
        ? [toIso(end - 100), toIso(end - 70), toIso(end - 32)]
        : late && opens > end - 25
          ? [toIso(replannedLikely - 18), toIso(replannedLikely), toIso(replannedLikely + 60)]
          : null;
      const isOpen = !overdue && replanned === null && opens <= end - 25;
      return {
        code: String(firstCode + index),
        name,
        city,
        country,
        coordinator: `${random.pick(FIRST_NAMES[country]!)} ${random.pick(FAMILY_NAMES[country]!)}`,
        planned,
        replanned,
        activatedOn: isOpen ? toIso(opens) : null,
        cap: 40,
      };
    }),
  );
}

/** A site's own gamma rate, Poisson days; each subject an exponential time to event and to loss. One site falls silent after its opening. */
function makeSubjects(random: DemoRandom, site: DemoSite, shape: Shape): DemoSubject[] {
  const opened = toDay(site.activatedOn!);
  const end = toDay(monthEnd(shape.lastMonth));
  const rate = random.gamma(1.5, shape.meanPerMonth) / DAYS_PER_MONTH;
  const silent = site.code === '208';
  const subjects: DemoSubject[] = [];
  for (
    let day = opened + random.exponential(1 / rate);
    day <= end && subjects.length < site.cap;
    day += random.exponential(1 / rate)
  ) {
    if (silent && day > opened + 60) break;
    const randomised = Math.floor(day);
    const event = randomised + random.exponential((shape.medianMonths / Math.LN2) * DAYS_PER_MONTH);
    const loss = randomised + random.exponential(DAYS_PER_MONTH / shape.lossPerMonth);
    const eventOn = event <= end && event < loss ? toIso(Math.floor(event)) : null;
    const withdrawnOn = loss <= end && loss < event ? toIso(Math.floor(loss)) : null;
    subjects.push({
      id: `${site.code}-${String(subjects.length + 1).padStart(3, '0')}`,
      site: site.code,
      randomisedOn: toIso(randomised),
      eventOn,
      withdrawnOn,
    });
  }
  return subjects;
}

function makeLog(random: DemoRandom, site: DemoSite, all: DemoSubject[], lastMonth: string): DemoMonth[] {
  if (!site.activatedOn) return [];
  const own = all.filter((subject) => subject.site === site.code);
  const inMonth = (month: string, day: (subject: DemoSubject) => string | null): number =>
    own.filter((subject) => day(subject)?.startsWith(month)).length;
  return monthsFrom(monthOf(site.activatedOn), lastMonth).map((month, index): DemoMonth => {
    const randomised = inMonth(month, (subject) => subject.randomisedOn);
    const failed = random.poisson(0.3 * randomised + 0.2);
    const corrected = ['103', '305', '502'].includes(site.code) && index === 5;
    const counts = {
      screened: randomised + failed + (random.uniform() < 0.1 ? 1 : 0),
      failed,
      randomised,
      events: inMonth(month, (subject) => subject.eventOn),
      withdrawn: inMonth(month, (subject) => subject.withdrawnOn),
    };
    return { site: site.code, month, counts, firstTyped: corrected ? { screened: counts.screened + 1 } : null };
  });
}

/** Who was randomised by the end of a day, and what was known of them. */
export function subjectsAsOf(trial: DemoTrial, cutoffOn: string): Subject[] {
  return trial.subjects
    .filter(({ randomisedOn }) => randomisedOn <= cutoffOn)
    .map(({ id, site, randomisedOn, eventOn, withdrawnOn }): Subject => {
      const head = { id, site, randomisedOn };
      if (eventOn && eventOn <= cutoffOn) return { ...head, status: 'event', statusOn: eventOn };
      if (withdrawnOn && withdrawnOn <= cutoffOn) return { ...head, status: 'withdrawn', statusOn: withdrawnOn };
      return { ...head, status: 'at-risk', statusOn: cutoffOn };
    });
}

/** The same as the blinded listing that a statistician uploads. */
export function subjectListing(trial: DemoTrial, cutoffOn: string): string {
  const rows = subjectsAsOf(trial, cutoffOn).map((subject) =>
    [subject.id, subject.site, subject.randomisedOn, subject.status, subject.statusOn].join(','),
  );
  return ['subject,site,randomised_on,status,status_on', ...rows].join('\r\n') + '\r\n';
}

/** When a site logs a month: a few days into the next one, in its morning. */
export function loggedAt(month: string, site: string): string {
  const day = 1 + ((Number(site) * 7 + Number(month.slice(5, 7))) % 5);
  const minute = (Number(site) * 13) % 60;
  return `${addDays(`${addMonths(month, 1)}-01`, day - 1)}T09:${String(minute).padStart(2, '0')}:00.000Z`;
}
