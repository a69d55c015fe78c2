import type { PlannedSites } from '@/components/studies/planned-sites';
import { numberTyped } from '@/components/ui/number-typed';
import { COUNTRY_CODES } from '@/lib/countries';
import { addDays, daysApart } from '@/lib/dates';
import type { Site, Study } from '@/lib/engine/types';
import type { Plan, PlanSite } from '@/lib/studies/schema';

const ISO = /^\d{4}-\d{2}-\d{2}$/;

/** Sites that open one by one, evenly between two days; none while the three fields are not in order. */
export function plannedSiteSet({ count, from, to }: PlannedSites, taken: readonly string[]): PlanSite[] {
  const sites = numberTyped(count);
  if (!sites || !Number.isInteger(sites) || sites < 1 || sites > 5000 || !ISO.test(from) || !ISO.test(to) || to < from)
    return [];
  const country = COUNTRY_CODES.find((code) => !taken.includes(code))!;
  const days = daysApart(from, to);
  return Array.from({ length: sites }, (_, place) => {
    const opens = addDays(from, sites === 1 ? 0 : Math.round((days * place) / (sites - 1)));
    return { code: `planned-${place + 1}`, country, earliest: opens, likely: opens, latest: opens, cap: null };
  });
}

/**
 * The plan alone as a study file without any data: every site still to open, all figures taken as known, nothing
 * observed. It begins two days before the first site may open, so that no site counts as overdue.
 */
export function planStudy(
  study: { code: string; title: string },
  plan: Plan,
  sites: readonly PlanSite[],
): Study | null {
  const first = sites.reduce<string | null>(
    (least, site) => (least === null || site.earliest < least ? site.earliest : least),
    null,
  );
  if (first === null) return null;
  const { ageing, ...enrolment } = plan.enrolment;
  return {
    format: 'kalends-study/1',
    study: { code: study.code, title: study.title },
    dataCutoff: addDays(first, -2),
    enrolment: {
      ...enrolment,
      rate: { ...enrolment.rate, basis: 'plan' },
      ...(ageing && { ageing: { ...ageing, basis: 'plan' as const } }),
      sites: sites.map(toSite),
    },
    ...(plan.events && {
      events: {
        ...plan.events,
        model: { ...plan.events.model, basis: 'plan' as const },
        dropout: { ...plan.events.dropout, basis: 'plan' as const },
      },
    }),
    milestones: plan.milestones,
    simulation: plan.simulation,
  };
}

function toSite({ code, country, earliest, likely, latest, cap }: PlanSite): Site {
  return { code, country, planned: { earliest, likely, latest }, cap };
}
