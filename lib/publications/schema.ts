import type { IsoDate, MilestoneForecast, MonthlyRow } from '../engine/types';

/** What readers of a publication see, and all that they see: nothing by site, nothing by treatment. */
export interface PublishedForecast {
  study: { code: string; title: string; sponsorName: string };
  dataCutoff: IsoDate;
  runNumber: number;
  observed: { randomised: number; events: number | null };
  /** Cumulative study totals at month ends up to the cut-off. */
  observedMonthly: { monthEnd: IsoDate; randomised: number; events: number | null }[];
  milestones: MilestoneForecast[];
  monthly: MonthlyRow[];
  /** The sponsor's wording, with the milestones each touches. */
  cautions: { code: string; text: string; milestones: string[] }[];
  provenance: { engineVersion: string; studySha256: string; seed: number; draws: number };
}
