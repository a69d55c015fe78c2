import { countryName } from '@/lib/countries';
import type { Milestone } from '@/lib/engine/types';
import { formatCount, formatDate, formatPercent, formatQuantity } from '@/lib/format';
import { milestoneWaits, planPercent, planQuantity } from '@/lib/studies/rules';
import type { Plan, PlanSite } from '@/lib/studies/schema';

/* Sections that are done, each as a sentence or two. */

const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];

/** `opening between 1 Jun 2027 and 24 May 2028`, out of the sites' own windows. */
export function sitesWords(sites: readonly PlanSite[]): string {
  if (sites.length === 0) return 'no site yet';
  const countries = new Set(sites.map((site) => site.country)).size;
  const first = sites.reduce((least, site) => (site.earliest < least ? site.earliest : least), sites[0]!.earliest);
  const last = sites.reduce((most, site) => (site.latest > most ? site.latest : most), sites[0]!.latest);
  const when =
    first === last ? `opening on ${formatDate(first)}` : `opening between ${formatDate(first)} and ${formatDate(last)}`;
  return `${formatQuantity(sites.length, 'site')} in ${formatQuantity(countries, 'country', 'countries')}, ${when}`;
}

export function targetSentence(enrolment: Plan['enrolment'], sites: readonly PlanSite[]): string {
  return `${formatQuantity(enrolment.target, 'patient')} from ${sitesWords(sites)}.`;
}

export function ratesSentence({
  rate,
  rampUp,
  countryRates = [],
  seasonality,
  ageing,
  calendar = [],
  countryCaps = [],
}: Plan['enrolment']): string {
  const season = (seasonality ?? []).flatMap((share, month) =>
    share === 1 ? [] : [`${MONTHS[month]} ${planPercent(share)}`],
  );
  return [
    `${rate.meanPerMonth} a month at a site, spread between sites (CV) ${rate.cv}, ${rate.basis === 'plan' ? 'taken as known' : 'estimated from the data as they come'}.`,
    rampUp && `The first ${planQuantity(rampUp.months, 'month')} at ${planPercent(rampUp.fraction)} of the rate.`,
    countryRates.length > 0 &&
      `${countryRates.map((row) => `${countryName(row.country)} ${row.meanPerMonth}`).join(', ')}.`,
    season.length > 0 && `Season: ${season.join(', ')}.`,
    otherParts({ ageing, calendar, countryCaps }),
  ]
    .filter(Boolean)
    .join(' ');
}

/** Parts that the study file knows and this page has no fields for. */
function otherParts({
  ageing,
  calendar = [],
  countryCaps = [],
}: Pick<Plan['enrolment'], 'ageing' | 'calendar' | 'countryCaps'>): string {
  const parts = [
    ageing && 'sites slow down with age',
    calendar.length > 0 && formatQuantity(calendar.length, 'pause or shock', 'pauses or shocks'),
    countryCaps.length > 0 && formatQuantity(countryCaps.length, 'country cap'),
  ].filter(Boolean);
  return parts.length > 0 ? `Also kept: ${parts.join(', ')}.` : '';
}

export function milestoneSentence(milestone: Milestone): string {
  const planned = milestone.plannedOn ? `, planned for ${formatDate(milestone.plannedOn)}` : '';
  return `${milestone.name ?? milestone.code} (${milestone.code}): ${milestoneWaits(milestone)}${planned}`;
}

export function eventsSentence(events: Plan['events']): string {
  if (!events) return 'No events are counted: the study has only an enrolment target.';
  const { model, dropout, followUpMonths } = events;
  return [
    `Median ${planQuantity(model.medianMonths, 'month')}, ${model.family === 'weibull' ? 'Weibull' : model.family}${model.shape === undefined ? '' : ` of shape ${model.shape}`},`,
    model.basis === 'plan'
      ? 'taken as known.'
      : `with the weight of ${planQuantity(model.priorEvents, 'event')} against the data.`,
    model.cureFraction ? `${planPercent(model.cureFraction)} never have the event.` : '',
    `${planPercent(dropout.perMonth)} lost to follow-up a month.`,
    followUpMonths
      ? `Each patient is followed for ${planQuantity(followUpMonths, 'month')}.`
      : 'Each patient is followed until the study ends.',
  ]
    .filter(Boolean)
    .join(' ');
}

export function simulationSentence({ draws, seed, horizonMonths }: Plan['simulation']): string {
  return `${formatCount(draws)} draws, seed ${seed}, up to ${formatQuantity(horizonMonths, 'month')} ahead.`;
}

/** An interim analysis as a share of the final number of events. */
export function informationWords(milestones: readonly { name: string; count: number }[]): string | null {
  const final = Math.max(...milestones.map((one) => one.count));
  const parts = milestones.filter((one) => one.count < final);
  if (parts.length === 0 || final <= 0) return null;
  return parts
    .map((one) => `${one.name || 'This one'} at ${formatPercent(one.count / final)} of the final number of events.`)
    .join(' ');
}
