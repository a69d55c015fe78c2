import type { SiteRow } from '../../entities/site';
import type { SiteInput, SiteView } from './schema';

export function serialiseSite(site: SiteRow): SiteView {
  return { id: site.id, ...inputOf(site), version: site.version };
}

/** The fields that a form holds, for comparing before with after. */
export function inputOf(site: SiteRow): SiteInput {
  const {
    code,
    name,
    city,
    country,
    plannedEarliest = null,
    plannedLikely = null,
    plannedLatest = null,
    activatedOn = null,
    closedOn = null,
    cap = null,
  } = site;
  return { code, name, city, country, plannedEarliest, plannedLikely, plannedLatest, activatedOn, closedOn, cap };
}
