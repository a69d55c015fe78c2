import { numberTyped } from '@/components/ui/number-typed';
import type { Plan } from '@/lib/studies/schema';

/** What stands in the fields of steps 2 and 3, as typed: a figure that is none yet must not be lost. */
export interface EnrolmentTyped {
  target: string;
  meanPerMonth: string;
  cv: string;
  basis: 'plan' | 'data';
  rampMonths: string;
  rampPercent: string;
  countryRates: { country: string; meanPerMonth: string }[];
  season: string[];
}

const USUAL = '1';

export const EMPTY_ENROLMENT: EnrolmentTyped = {
  target: '',
  meanPerMonth: '',
  cv: '0.8',
  basis: 'data',
  rampMonths: '',
  rampPercent: '50',
  countryRates: [],
  season: Array<string>(12).fill(USUAL),
};

/** Decimal fractions as people type them: 0.007 is 0.7 %, not 0.7000000000000001. */
export const asPercent = (share: number): string => String(Number((share * 100).toPrecision(12)));

/** Empty stays null and what is no number NaN, so that the schema refuses both by name. */
export function shareTyped(percent: string): number | null {
  const typed = numberTyped(percent);
  return typed === null ? null : Number((typed / 100).toPrecision(12));
}

export function enrolmentTyped(saved: Plan['enrolment'] | null): EnrolmentTyped {
  if (!saved) return EMPTY_ENROLMENT;
  return {
    target: String(saved.target),
    meanPerMonth: String(saved.rate.meanPerMonth),
    cv: String(saved.rate.cv),
    basis: saved.rate.basis,
    rampMonths: saved.rampUp ? String(saved.rampUp.months) : '',
    rampPercent: saved.rampUp ? asPercent(saved.rampUp.fraction) : EMPTY_ENROLMENT.rampPercent,
    countryRates: (saved.countryRates ?? []).map((row) => ({
      country: row.country,
      meanPerMonth: String(row.meanPerMonth),
    })),
    season: saved.seasonality ? saved.seasonality.map(String) : EMPTY_ENROLMENT.season,
  };
}

/** Back to the plan's own form. Parts that have no field here (ageing, pauses, caps) stay as they were saved. */
export function enrolmentValue(typed: EnrolmentTyped, saved: Plan['enrolment'] | null): unknown {
  const { ageing, calendar, countryCaps } = saved ?? {};
  const rampMonths = numberTyped(typed.rampMonths);
  const season = typed.season.map((share) => numberTyped(share) ?? 1);
  return {
    target: numberTyped(typed.target),
    rate: { meanPerMonth: numberTyped(typed.meanPerMonth), cv: numberTyped(typed.cv), basis: typed.basis },
    ...(typed.countryRates.length > 0 && {
      countryRates: typed.countryRates.map((row) => ({
        country: row.country,
        meanPerMonth: numberTyped(row.meanPerMonth),
      })),
    }),
    ...(season.some((share) => share !== 1) && { seasonality: season }),
    ...(rampMonths !== null &&
      rampMonths !== 0 && { rampUp: { months: rampMonths, fraction: shareTyped(typed.rampPercent) } }),
    ...(ageing && { ageing }),
    ...(calendar && { calendar }),
    ...(countryCaps && { countryCaps }),
  };
}

const FIELDS: Record<string, string> = {
  'rate.meanPerMonth': 'meanPerMonth',
  'rate.cv': 'cv',
  'rate.basis': 'basis',
  'rampUp.months': 'rampMonths',
  'rampUp.fraction': 'rampPercent',
  seasonality: 'season.0',
};

/** The field at which a fault of the section is shown. */
export function enrolmentField(path: string): string {
  if (path.startsWith('seasonality.')) return path.replace('seasonality', 'season');
  return FIELDS[path] ?? path;
}

/** Steps 2 and 3 are one section of the plan; a fault counts at the step whose field it is. */
export function isTargetField(field: string): boolean {
  return field === 'target';
}
