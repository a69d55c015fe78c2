import type { ComponentProps, ReactNode } from 'react';
import { joinClasses } from '@/components/ui/join-classes';

interface DisclosureProps extends Omit<ComponentProps<'details'>, 'title'> {
  /** "Show the numbers" unless another is given. */
  title?: ReactNode;
}

/** Folded away under a line with a plus sign. It works without script and opens for print and for a search in the page. */
export function Disclosure({ title = 'Show the numbers', className, children, ...rest }: DisclosureProps) {
  return (
    <details {...rest} className={joinClasses('group', className)}>
      <summary className="flex list-none gap-2 border-b border-rule py-2.5 font-600 [&::-webkit-details-marker]:hidden">
        <span aria-hidden="true" className="w-3 font-title text-18 leading-[22px] font-400">
          <span className="group-open:hidden">+</span>
          <span className="hidden group-open:inline">−</span>
        </span>
        {title}
      </summary>
      {children}
    </details>
  );
}
