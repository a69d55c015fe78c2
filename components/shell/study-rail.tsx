import Link from 'next/link';
import { joinClasses } from '@/components/ui/join-classes';

export interface RailItem {
  label: string;
  href: string;
  /** What stands in the section now: "52 of 64", "3 due", "run 8". */
  value?: string;
  /** Due, overdue, stale: in the caution's colour. */
  caution?: boolean;
  current?: boolean;
}

interface StudyRailProps {
  code: string;
  title: string;
  items: readonly RailItem[];
}

/** The slim list of a study's sections; on a phone one line that scrolls sideways. */
export function StudyRail({ code, title, items }: StudyRailProps) {
  return (
    <nav aria-label="Study" className="pt-3 text-13 md:pt-5 screen-only">
      <p className="font-title text-24 font-500">{code}</p>
      <p className="hidden text-ink-soft md:mb-5 md:block">{title}</p>
      <ul className="-mx-4 flex gap-5 overflow-x-auto border-y border-rule px-4 md:mx-0 md:block md:overflow-visible md:border-y-0 md:px-0">
        {items.map((item, place) => (
          <li
            key={item.href}
            className={joinClasses(
              'flex-none',
              item.current ? 'md:border-y-2 md:border-ink' : 'md:border-t md:border-rule md:last:border-b',
              items[place - 1]?.current && 'md:border-t-0',
            )}
          >
            <Link
              href={item.href}
              aria-current={item.current ? 'page' : undefined}
              className={joinClasses(
                'flex min-h-11 items-center justify-between gap-2 py-[7px] no-underline hover:underline md:min-h-8 md:items-baseline',
                item.current && 'font-600 underline md:no-underline',
              )}
            >
              {item.label}
              {item.value && (
                <span
                  className={joinClasses(
                    'font-400 whitespace-nowrap',
                    item.caution ? 'text-caution' : item.current ? 'text-ink' : 'hidden text-ink-soft md:inline',
                  )}
                >
                  {item.value}
                </span>
              )}
            </Link>
          </li>
        ))}
      </ul>
    </nav>
  );
}
