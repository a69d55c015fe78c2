import type { Forecast, Study } from '@/lib/engine/types';

/** What the page asks the worker. A newer question makes the older ones idle. */
export interface ForecastQuestion {
  number: number;
  study: Study;
  /** First few draws for a quick look, then more. */
  draws: number[];
}

export type ForecastAnswer =
  | { number: number; kind: 'forecast'; forecast: Forecast; isLast: boolean }
  | { number: number; kind: 'error'; message: string };
