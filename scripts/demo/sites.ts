import { act } from '@/scripts/demo/acting';
import type { DemoMonth, DemoSite } from '@/scripts/demo/generate';
import { loggedAt } from '@/scripts/demo/generate';
import type { Timeline } from '@/scripts/demo/timeline';
import type { Actor } from '@/lib/auth/scope';
import { addDays, addMonths } from '@/lib/dates';
import { correctMonth, logMonth } from '@/lib/site-log/commands';
import { LOG_FIELDS } from '@/lib/site-log/schema';
import { addSite, changeSite } from '@/lib/sites/commands';
import type { SiteView } from '@/lib/sites/schema';

const morning = (date: string, minute = 0): string => `${date}T08:${String(minute % 60).padStart(2, '0')}:00.000Z`;

/** The site as its manager first enters it: planned, not yet open. */
export async function enterSite(manager: Actor, code: string, site: DemoSite, at: string): Promise<SiteView> {
  const [plannedEarliest, plannedLikely, plannedLatest] = site.planned;
  const facts = { code: site.code, name: site.name, city: site.city, country: site.country, cap: site.cap };
  const body = { ...facts, plannedEarliest, plannedLikely, plannedLatest, activatedOn: null, closedOn: null };
  return act(manager, code, 'sites:change', at, (scope, context) => addSite(scope, { body }, context));
}

/** Its activation on the day after, and a new window where its country came late. */
export function planSiteActs(
  timeline: Timeline,
  manager: Actor,
  code: string,
  site: DemoSite,
  entered: SiteView,
  replannedOn: string,
): void {
  let known = entered;
  const change =
    (facts: Partial<SiteView>) =>
    async (at: string): Promise<void> => {
      const { id: _id, ...body } = { ...known, ...facts };
      known = await act(manager, code, 'sites:change', at, (scope, context) =>
        changeSite(scope, { params: { site: site.code }, body }, context),
      );
    };
  if (site.replanned) {
    const [plannedEarliest, plannedLikely, plannedLatest] = site.replanned;
    timeline.add(morning(replannedOn, Number(site.code)), change({ plannedEarliest, plannedLikely, plannedLatest }));
  }
  if (site.activatedOn)
    timeline.add(morning(addDays(site.activatedOn, 1), Number(site.code)), change({ activatedOn: site.activatedOn }));
}

/** A month as its coordinator logs it, and the correction of a slip three weeks later. */
export function planLogActs(timeline: Timeline, coordinator: Actor, code: string, entry: DemoMonth): void {
  const params = { code, site: entry.site, month: entry.month };
  const typed = { ...entry.counts, ...entry.firstTyped };
  timeline.add(loggedAt(entry.month, entry.site), (at) =>
    act(coordinator, code, 'site-log:log', at, (scope, context) =>
      logMonth(scope, { params, body: { version: null, source: 'screen', cells: typed } }, context),
    ),
  );
  if (!entry.firstTyped) return;
  const wrong = LOG_FIELDS.filter((field) => typed[field] !== entry.counts[field]);
  const cells = Object.fromEntries(wrong.map((field) => [field, { from: typed[field], to: entry.counts[field] }]));
  timeline.add(`${addMonths(entry.month, 1)}-24T14:05:00.000Z`, (at) =>
    act(coordinator, code, 'site-log:correct', at, (scope, context) =>
      correctMonth(
        scope,
        {
          params,
          body: {
            source: 'screen',
            cells,
            reasonKind: 'typing-error',
            reason: 'A screening number was counted twice.',
          },
        },
        context,
      ),
    ),
  );
}
