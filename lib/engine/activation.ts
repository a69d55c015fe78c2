/** The three starts of an activation window, as moments: days after the end of the cut-off day, in order. */
export interface ActivationWindow {
  earliest: number;
  likely: number;
  latest: number;
}

/**
 * Activation moment of a planned site: triangular(earliest, likely, latest), conditioned on being after the cut-off
 * (moment 0), by inversion.
 *
 * @param window with `latest` after the cut-off
 * @param uniform from (0, 1)
 */
export function activationMoment(window: ActivationWindow, uniform: number): number {
  const { earliest, likely, latest } = window;
  const width = latest - earliest;
  if (width <= 0) return latest;
  // In terms of the upper tail, which keeps its digits when nearly the whole window has passed.
  const tail = (1 - uniform) * shareAfterCutoff(window);
  const share = 1 - tail;
  const rises = (likely - earliest) / width;
  const moment =
    share <= rises
      ? earliest + Math.sqrt(share * width * (likely - earliest))
      : latest - Math.sqrt(tail * width * (latest - likely));
  return Math.max(0, moment);
}

/** P(T > 0) of triangular(earliest, likely, latest), latest > 0. */
function shareAfterCutoff({ earliest, likely, latest }: ActivationWindow): number {
  if (earliest >= 0) return 1;
  const width = latest - earliest;
  if (likely >= 0) return 1 - (earliest * earliest) / (width * (likely - earliest));
  return (latest * latest) / (width * (latest - likely));
}

/** Mean delay after the cut-off of a site whose whole window has passed without its activation, in days. */
export const OVERDUE_MEAN_DELAY_DAYS = 30;
