/** Bounds of the study file: generous for any real trial, tight enough that a slip of the finger is caught. */
export const LIMITS = {
  fileBytes: 64 * 1024 * 1024,
  sites: 5_000,
  subjects: 200_000,
  draws: 1_000_000,
  milestones: 50,
  ratePerMonth: 1_000,
  count: 1_000_000,
  months: 1_200,
  horizonMonths: 600,
  firstDate: '1990-01-01',
  lastDate: '2100-12-31',
  cv: { least: 0.01, most: 10 },
  shape: { least: 0.05, most: 20 },
} as const;
