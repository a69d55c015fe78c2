import { ForecastFigure, type ForecastFigureProps } from '@/components/charts/forecast-figure';

/** The figure as a preview beside a form: names and hills, no dates, nothing to read out. */
export function CompactForecastFigure(props: Omit<ForecastFigureProps, 'compact'>) {
  return <ForecastFigure {...props} compact />;
}
