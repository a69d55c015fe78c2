import type { ReactNode } from 'react';

interface EmptyStateProps {
  title: ReactNode;
  /** Why there is nothing, and what would bring something. */
  children?: ReactNode;
  action?: ReactNode;
  /** A thing that stopped is no empty page: its title stands in the colour of errors. */
  tone?: 'plain' | 'stop';
  /** The page's own title, where the state is all that the page has. */
  heading?: boolean;
  /** What to quote when asking for help. */
  reference?: ReactNode;
}

/** Nothing yet, at work, stopped, not open to you: one form for all, so that each is recognised. */
export function EmptyState({ title, children, action, tone = 'plain', heading = false, reference }: EmptyStateProps) {
  const Title = heading ? 'h1' : 'p';
  return (
    <div className="max-w-measure border-t border-rule pt-2.5">
      <Title className={tone === 'stop' ? 'font-title text-24 text-stop' : 'font-title text-24'}>{title}</Title>
      {children && <div className="mt-1 space-y-1">{children}</div>}
      {action && <div className="mt-3 flex flex-wrap items-center gap-3">{action}</div>}
      {reference && <p className="mt-3 text-13 text-ink-soft">{reference}</p>}
    </div>
  );
}
