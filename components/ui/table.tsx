import { useId, type ComponentProps, type ReactNode } from 'react';
import { joinClasses } from '@/components/ui/join-classes';
import { ScrollBox } from '@/components/ui/scroll-box';

interface TableProps extends ComponentProps<'table'> {
  /** What the table holds, for those who hear it; drawn above it with `captionShown`. */
  caption: ReactNode;
  captionShown?: boolean;
  /** Lower rows in 13 px, for tables of many numbers. */
  dense?: boolean;
}

/** A table that reads like one: hairlines, a sunk head, a total under a double rule. It scrolls sideways before it breaks the page. */
export function Table({ caption, captionShown = false, dense = false, className, children, ...rest }: TableProps) {
  const captionId = useId();
  return (
    <ScrollBox labelledBy={captionId}>
      <table
        {...rest}
        className={joinClasses('w-full border-collapse', dense ? 'table-dense text-13' : 'text-15', className)}
      >
        <caption id={captionId} className={captionShown ? 'pb-2 text-left text-13 text-ink-soft' : 'sr-only'}>
          {caption}
        </caption>
        {children}
      </table>
    </ScrollBox>
  );
}

interface CellProps {
  /** Figures stand right, so that their places line up. */
  num?: boolean;
}

export function TableHead(props: ComponentProps<'thead'>) {
  return <thead {...props} />;
}

export function TableBody(props: ComponentProps<'tbody'>) {
  return <tbody {...props} />;
}

/** Totals, under a double rule. */
export function TableFoot({ className, ...rest }: ComponentProps<'tfoot'>) {
  return <tfoot {...rest} className={joinClasses('rule-double-t', className)} />;
}

export function Row(props: ComponentProps<'tr'>) {
  return <tr {...props} />;
}

export function HeadCell({ num = false, className, ...rest }: ComponentProps<'th'> & CellProps) {
  return (
    <th
      scope="col"
      {...rest}
      className={joinClasses(
        'border-b border-rule-strong bg-paper-sunk px-2.5 py-2 align-bottom text-13 font-600 text-ink-soft',
        num ? 'text-right' : 'text-left',
        className,
      )}
    />
  );
}

const CELL =
  'border-b border-rule px-2.5 py-[9px] align-baseline in-[.table-dense]:py-[5px] in-[tfoot]:border-b-0 in-[tfoot]:font-600';

export function RowHead({ num = false, className, ...rest }: ComponentProps<'th'> & CellProps) {
  return (
    <th scope="row" {...rest} className={joinClasses(CELL, 'font-400', num ? 'text-right' : 'text-left', className)} />
  );
}

export function Cell({ num = false, className, ...rest }: ComponentProps<'td'> & CellProps) {
  return <td {...rest} className={joinClasses(CELL, num && 'text-right', className)} />;
}

/** The second line of a cell. */
export function SubLine({ className, ...rest }: ComponentProps<'span'>) {
  return <span {...rest} className={joinClasses('block text-13 font-400 text-ink-soft', className)} />;
}
