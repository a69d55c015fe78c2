import { Button } from '@/components/ui/button';
import { Mark } from '@/components/ui/mark';
import { CONTROL_LOOK } from '@/components/ui/field';
import { joinClasses } from '@/components/ui/join-classes';
import { formatPercent } from '@/lib/format';
import type { PortfolioQuery } from '@/lib/portfolio/schema';

/** A plain form: it works before any script has run, and the address can be sent on. */
export function PortfolioFind({ query, legend }: { query: PortfolioQuery; legend: boolean }) {
  return (
    <div className="mb-3 items-center justify-between gap-5 md:flex">
      <form role="search" action="/studies" className="flex gap-3">
        <label htmlFor="find-study" className="sr-only">
          Find a study
        </label>
        <input
          id="find-study"
          name="search"
          type="search"
          maxLength={100}
          defaultValue={query.search}
          placeholder="Code, title or sponsor"
          className={joinClasses(CONTROL_LOOK, 'md:w-[280px]')}
        />
        <input type="hidden" name="order" value={query.order} />
        <Button type="submit" variant="second">
          Find
        </Button>
      </form>
      {legend && (
        <p className="mt-2 text-13 text-ink-soft md:mt-0 md:text-right">
          <Mark kind="patients" /> patients &nbsp; <Mark kind="events" /> events &nbsp; <Mark kind="planned" /> planned
          &nbsp; a bracket holds {formatPercent(0.8)}; a dashed line is the slip from plan
        </p>
      )}
    </div>
  );
}
