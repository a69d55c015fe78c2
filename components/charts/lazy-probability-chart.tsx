'use client';

import dynamic from 'next/dynamic';

/** The plotting library is large, so it comes only with the first chart that needs it. */
export const LazyProbabilityChart = dynamic(
  () => import('@/components/charts/probability-chart').then((module) => module.ProbabilityChart),
  {
    ssr: false,
    loading: () => <div className="h-60 text-13 text-ink-soft">Drawing</div>,
  },
);
