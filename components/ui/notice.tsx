import type { ReactNode } from 'react';
import { joinClasses } from '@/components/ui/join-classes';

export type NoticeTone = 'plain' | 'caution' | 'stop';

const TONES: Record<NoticeTone, string> = {
  plain: 'border-rule-strong bg-paper-sunk',
  caution: 'border-caution bg-caution-paper',
  stop: 'border-stop bg-paper',
};

const TITLES: Record<NoticeTone, string> = { plain: 'text-ink', caution: 'text-caution', stop: 'text-stop' };

interface NoticeProps {
  tone?: NoticeTone;
  title?: ReactNode;
  children?: ReactNode;
  action?: ReactNode;
  /** Read out when it appears: an outcome that came while the reader was elsewhere on the page. */
  live?: boolean;
  className?: string;
}

/** A note between two rules. The colour is never the only sign: its title says what it is. */
export function Notice({ tone = 'plain', title, children, action, live = false, className }: NoticeProps) {
  const role = live ? (tone === 'stop' ? 'alert' : 'status') : undefined;
  return (
    <div role={role} className={joinClasses('border-y px-5 py-3', TONES[tone], className)}>
      {title && <p className={joinClasses('font-600', TITLES[tone])}>{title}</p>}
      {children && <div className={title ? 'mt-1' : undefined}>{children}</div>}
      {action && <div className="mt-3 flex flex-wrap gap-3">{action}</div>}
    </div>
  );
}
