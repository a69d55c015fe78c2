import type { ReactNode } from 'react';

interface ProgressBarProps {
  /** What is being done: "Drawing 10,000 futures". */
  label: string;
  /** Share done, 0 to 1; null while it is not known. */
  share: number | null;
  /** How far in words: "6,250 done, about 4 s left". */
  detail?: ReactNode;
}

export function ProgressBar({ label, share, detail }: ProgressBarProps) {
  const percent = share === null ? null : Math.round(Math.min(1, Math.max(0, share)) * 100);
  return (
    <div>
      <p>
        {label}
        {detail && <>: {detail}</>}
      </p>
      <div
        role="progressbar"
        aria-label={label}
        aria-valuemin={0}
        aria-valuemax={100}
        aria-valuenow={percent ?? undefined}
        className="mt-2 h-[9px] border border-ink"
      >
        <div
          className={percent === null ? 'h-full w-1/4 bg-ink motion-safe:animate-pulse' : 'h-full bg-ink'}
          style={percent === null ? undefined : { width: `${percent}%` }}
        />
      </div>
    </div>
  );
}
