import example from '@/components/landing/example-trial.json';
import type { FigureData } from '@/components/charts/figure-data';
import type { MilestoneForecast, MonthlyRow } from '@/lib/engine/types';

/** The saved numbers of an invented trial: the figure stands on the first page before any script has run. */
export const exampleTrial: FigureData = {
  cutoff: example.cutoff,
  observed: example.observed,
  plan: example.plan,
  monthly: example.monthly as MonthlyRow[],
  milestones: example.milestones as MilestoneForecast[],
};
