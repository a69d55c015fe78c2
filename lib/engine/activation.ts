/** The three starts of an activation window, as moments: days after the end of the cut-off day, in order. */
export interface ActivationWindow {
  earliest: number;
  likely: number;
  latest: number;
}

/**
 * Activation moment of a planned site: triangular(earliest, likely, latest), conditioned on being after the cut-off
 * (moment 0), by inversion of the distribution function over (F(0), 1).
 *
 * @param window with `latest` after the cut-off
 * @param uniform from (0, 1)
 */
export function activationMoment(window: ActivationWindow, uniform: number): number {
  const { earliest, likely, latest } = window;
  const width = latest - earliest;
  if (width <= 0) return latest;
  const before = triangularShare(window, 0);
  const share = before + uniform * (1 - before);
  const rising = (likely - earliest) / width;
  if (share <= rising) return Math.max(0, earliest + Math.sqrt(share * width * (likely - earliest)));
  // In terms of the upper tail, which keeps its digits when nearly the whole window has passed.
  const tail = (1 - uniform) * (1 - before);
  return Math.max(0, latest - Math.sqrt(tail * width * (latest - likely)));
}

/** Distribution function of triangular(earliest, likely, latest). */
function triangularShare({ earliest, likely, latest }: ActivationWindow, moment: number): number {
  if (moment <= earliest) return 0;
  if (moment >= latest) return 1;
  const width = latest - earliest;
  if (moment <= likely) return (moment - earliest) ** 2 / (width * (likely - earliest));
  return 1 - (latest - moment) ** 2 / (width * (latest - likely));
}

/** Mean delay after the cut-off of a site whose whole window has passed without its activation, in days. */
export const OVERDUE_MEAN_DELAY_DAYS = 30;
