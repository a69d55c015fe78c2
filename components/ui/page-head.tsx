import Link from 'next/link';
import { Fragment, type ReactNode } from 'react';

export interface PathStep {
  label: string;
  href?: string;
}

export interface HeadFigure {
  /** What the figure is, above it: "Interim analysis, the 288th event". */
  label: ReactNode;
  value: ReactNode;
  /** Beside it in small type: "80 %". */
  unit?: ReactNode;
  /** Lines under it. */
  below?: ReactNode;
}

interface PageHeadProps {
  /** The sentence of a path: KLD-301 · Forecasts · 5 Apr 2027. */
  path?: readonly PathStep[];
  title: ReactNode;
  lead?: ReactNode;
  figure?: HeadFigure;
  /** The one action, with what it does and the ways on. */
  action?: ReactNode;
}

/** What it is, the one figure that matters, the one action. */
export function PageHead({ path = [], title, lead, figure, action }: PageHeadProps) {
  return (
    <header className="pb-5 md:grid md:grid-cols-12 md:gap-x-5">
      <div className={action ? 'md:col-span-8' : 'md:col-span-12'}>
        {path.length > 0 && (
          <nav aria-label="Where you are" className="text-13 text-ink-soft">
            {path.map((step, place) => (
              <Fragment key={`${step.label}-${place}`}>
                {place > 0 && ' · '}
                {step.href ? (
                  <Link href={step.href} className="no-underline hover:underline">
                    {step.label}
                  </Link>
                ) : (
                  step.label
                )}
              </Fragment>
            ))}
          </nav>
        )}
        <h1 className="mt-1">{title}</h1>
        {lead && <div className="mt-1 text-ink-soft">{lead}</div>}
        {figure && (
          <div className="mt-5">
            <p>{figure.label}</p>
            <p className="font-title text-34 font-400 tracking-[-0.02em] md:text-48">
              {figure.value}
              {figure.unit && (
                <span className="font-text text-18 tracking-normal text-ink-soft"> &nbsp;{figure.unit}</span>
              )}
            </p>
            {figure.below && <div className="mt-1">{figure.below}</div>}
          </div>
        )}
      </div>
      {action && (
        <div className="space-y-3 pt-3 md:col-span-4 md:border-l md:border-rule md:pt-6 md:pl-5">{action}</div>
      )}
    </header>
  );
}
