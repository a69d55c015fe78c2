import { monthOf } from '../dates';
import type { SubjectStatus } from '../engine/types';
import { formatCount, formatDate, formatQuantity } from '../format';
import type { SiteEnrolment } from '../site-log/queries';
import type { ReadSubject, SubjectFault } from '../subject-listings/rules';
import { type ListedSubject, SUBJECT_STATUSES } from '../subject-listings/schema';
import type { AcceptAggregateBody, CutCounts, ReconciledSite, SiteDifference } from './schema';

/** What the rules need to know of a study's site. */
export interface CutSite {
  activatedOn: string | null;
  closedOn: string | null;
}

export function cutoffFault(cutoffOn: string, today: string): string | null {
  return cutoffOn > today
    ? `${formatDate(cutoffOn)} lies ahead. A cut-off is a day up to which the data are known: today or earlier.`
    : null;
}

/** What only the study knows to be wrong with a row. A field that could not be read is empty and passed over. */
export function subjectFaults(
  { site: code, randomisedOn, statusOn }: ReadSubject,
  { sites, cutoffOn }: { sites: ReadonlyMap<string, CutSite>; cutoffOn: string },
): SubjectFault[] {
  const faults: SubjectFault[] = [];
  const cutoff = formatDate(cutoffOn);
  const site = sites.get(code);
  if (code !== '' && !site)
    faults.push({ field: 'site', detail: `The study has no site ${code}. Correct the code, or add the site first.` });
  if (site && !site.activatedOn)
    faults.push({ field: 'site', detail: `Site ${code} has no day of activation. Record it first.` });
  if (randomisedOn !== '') {
    if (site?.activatedOn && randomisedOn < site.activatedOn) {
      const detail = `Site ${code} opened on ${formatDate(site.activatedOn)}. Give that day or a later one, or correct the activation.`;
      faults.push({ field: 'randomisedOn', detail });
    }
    if (site?.closedOn && randomisedOn > site.closedOn) {
      const detail = `Site ${code} closed on ${formatDate(site.closedOn)}. Give that day or an earlier one, or correct the closure.`;
      faults.push({ field: 'randomisedOn', detail });
    }
    if (randomisedOn > cutoffOn)
      faults.push({
        field: 'randomisedOn',
        detail: `This is after the cut-off, ${cutoff}. Leave the subject out, or move the cut-off.`,
      });
  }
  if (statusOn !== '' && statusOn > cutoffOn) {
    const detail = `This is after the cut-off, ${cutoff}. Give the status as it was on that day, or move the cut-off.`;
    faults.push({ field: 'statusOn', detail });
  }
  if (statusOn !== '' && randomisedOn !== '' && statusOn < randomisedOn) {
    const detail = `This is before the randomisation, ${formatDate(randomisedOn)}. Give that day or a later one.`;
    faults.push({ field: 'statusOn', detail });
  }
  return faults;
}

export function countSubjects(subjects: readonly { status: SubjectStatus }[]): CutCounts {
  const byStatus = Object.fromEntries(SUBJECT_STATUSES.map((status) => [status, 0])) as CutCounts['byStatus'];
  for (const { status } of subjects) byStatus[status] += 1;
  return { subjects: subjects.length, byStatus };
}

export function countAggregate({ events, withdrawn, atRisk }: AcceptAggregateBody): CutCounts {
  return {
    subjects: events + withdrawn + atRisk,
    byStatus: { event: events, 'event-pending': 0, withdrawn, completed: 0, 'at-risk': atRisk },
  };
}

/**
 * Listing and log side by side, site by site, up to the cut-off. They are compared on the months that the site has logged;
 * subjects of other months stand beside, for a month not logged says nothing.
 */
export function reconcile(
  subjects: readonly Pick<ListedSubject, 'site' | 'randomisedOn'>[],
  logged: readonly SiteEnrolment[],
): ReconciledSite[] {
  const months = new Map<string, string[]>();
  for (const { site, randomisedOn } of subjects) {
    const own = months.get(site);
    if (own) own.push(monthOf(randomisedOn));
    else months.set(site, [monthOf(randomisedOn)]);
  }
  return logged.flatMap((site) => {
    const own = months.get(site.code) ?? [];
    if (own.length === 0 && site.monthly.length === 0) return [];
    const reported = new Set(site.monthly.map(({ month }) => month));
    const notLogged = own.filter((month) => !reported.has(month)).length;
    const agrees = own.length - notLogged === site.randomised;
    return [{ site: site.code, listed: own.length, logged: site.randomised, notLogged, agrees }];
  });
}

export function differencesOf(sites: readonly ReconciledSite[]): SiteDifference[] {
  return sites.filter((site) => !site.agrees).map(({ agrees: _, ...difference }) => difference);
}

/** With totals only the study as a whole can be compared: everybody randomised has had the event, left, or is at risk. */
export function aggregateDifference(counts: CutCounts, logged: readonly SiteEnrolment[]): SiteDifference[] {
  const randomised = logged.reduce((sum, site) => sum + site.randomised, 0);
  return counts.subjects === randomised
    ? []
    : [{ site: null, listed: counts.subjects, logged: randomised, notLogged: 0 }];
}

export function aggregateFaults({ events, withdrawn, atRisk, personMonths }: AcceptAggregateBody): SubjectTotalFault[] {
  const faults: SubjectTotalFault[] = [];
  const subjects = events + withdrawn + atRisk;
  if (subjects === 0)
    faults.push({ pointer: '/atRisk', detail: 'Nobody is counted. A data cut counts those who have been randomised.' });
  if (subjects > 0 && personMonths <= 0)
    faults.push({ pointer: '/personMonths', detail: 'Give the time at risk of all subjects together, above 0.' });
  return faults;
}

interface SubjectTotalFault {
  pointer: string;
  detail: string;
}

/** Why a note is asked for, in words. */
export function noteNeededSentence(differences: readonly SiteDifference[]): string {
  const [whole] = differences;
  if (whole?.site === null)
    return `The totals make ${formatCount(whole.listed)} subjects, the log has ${formatCount(whole.logged)} randomised. Say in a note why they differ.`;
  const codes = differences.slice(0, 5).map((one) => one.site);
  const more = differences.length > 5 ? ` and ${formatCount(differences.length - 5)} more` : '';
  return `Listing and log disagree at ${formatQuantity(differences.length, 'site')} (${codes.join(', ')}${more}). Say in a note why they differ.`;
}
