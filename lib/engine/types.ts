/**
 * The engine's view of the public contract: what a study file holds once it has been checked, and what a forecast file
 * holds. `lib/study-file` has the zod schemas that parse into `Study` and describe `Forecast`; the engine itself imports
 * no schema library, so that it stays pure and small in a Web Worker. Field meanings: README, "The study file".
 */

/** Calendar date, `YYYY-MM-DD`. */
export type IsoDate = string;
/** Calendar month, `YYYY-MM`. */
export type IsoMonth = string;

export type Basis = 'plan' | 'data';

export type Family =
  'exponential' | 'weibull' | 'log-normal' | 'log-logistic' | 'gamma' | 'piecewise-exponential' | 'average';

export interface Site {
  code: string;
  country: string;
  activatedOn?: IsoDate | null;
  activationIsFirstPatient?: boolean;
  planned?: { earliest: IsoDate; likely: IsoDate; latest: IsoDate } | null;
  closedOn?: IsoDate | null;
  cap?: number | null;
  randomised?: number;
  loggedThrough?: IsoDate;
  inScreening?: number;
  unlogged?: IsoMonth[];
  monthly?: { month: IsoMonth; randomised: number }[];
}

export interface Enrolment {
  target: number;
  rate: { meanPerMonth: number; cv: number; basis: Basis };
  countryRates?: { country: string; meanPerMonth: number }[];
  /** Multiplier per calendar month, January first; used as given, not rescaled. */
  seasonality?: number[];
  rampUp?: { months: number; fraction: number };
  ageing?: { basis: Basis; floor: number; months: number };
  calendar?: { from: IsoDate; to: IsoDate; countries?: string[]; sites?: string[]; multiplier: number }[];
  countryCaps?: { country: string; cap: number }[];
  screening?: { days: number; passed: number; failed: number };
  sites: Site[];
}

export type SubjectStatus = 'event' | 'event-pending' | 'withdrawn' | 'completed' | 'at-risk';

export interface Subject {
  id: string;
  site: string;
  randomisedOn: IsoDate;
  status: SubjectStatus;
  statusOn: IsoDate;
}

export interface AggregateEvents {
  events: number;
  withdrawn: number;
  atRisk: number;
  personMonths: number;
}

export interface EventsPart {
  model: {
    family: Family;
    medianMonths: number;
    shape?: number;
    cutsMonths?: number[];
    cureFraction?: number;
    basis: Basis;
    priorEvents: number;
  };
  dropout: { perMonth: number; basis: Basis; priorEvents: number };
  followUpMonths?: number | null;
  adjudication?: { confirmed: number; refuted: number; medianLagDays: number };
  subjects?: Subject[];
  aggregate?: AggregateEvents;
}

interface MilestoneBase {
  code: string;
  name?: string;
  plannedOn?: IsoDate | null;
}

export type Milestone = MilestoneBase &
  (
    | { kind: 'randomised' | 'events'; count: number }
    | { kind: 'follow-up'; months: number }
    | { kind: 'all-of'; of: string[] }
  );

export type MilestoneKind = Milestone['kind'];

/** A checked study file (`format: "kalends-study/1"`). */
export interface Study {
  format: 'kalends-study/1';
  study: { code: string; title: string };
  /** Data hold through the END of this day. */
  dataCutoff: IsoDate;
  enrolment: Enrolment;
  events?: EventsPart;
  milestones: Milestone[];
  simulation: { draws: number; seed: number; horizonMonths: number };
}

export const QUANTILE_LEVELS = ['0.025', '0.05', '0.1', '0.25', '0.5', '0.75', '0.9', '0.95', '0.975'] as const;
export type QuantileLevel = (typeof QUANTILE_LEVELS)[number];

export interface EventsFit {
  family: Exclude<Family, 'average'>;
  weight: number;
  ratePerMonth?: number;
  mu?: number;
  sigma?: number;
  shape?: number;
  scaleMonths?: number;
  ratesPerMonth?: number[];
  medianMonths: number | null;
  logLikelihood: number;
  aic: number;
}

export interface ForecastFit {
  enrolment: { meanPerMonth: number; shape: number | null; logLikelihood: number } | null;
  events: EventsFit[] | null;
  dropout: { perMonth: number } | null;
}

export interface MilestoneForecast {
  code: string;
  name?: string;
  kind: MilestoneKind;
  count?: number;
  months?: number;
  of?: string[];
  plannedOn?: IsoDate | null;
  reachedOn: IsoDate | null;
  probabilityReached: number;
  probabilityByPlanned: number | null;
  quantiles: Record<QuantileLevel, IsoDate | null>;
  monteCarloErrorDays: number | null;
  /** Per week (Mondays), draws that get there only; shares add up to `probabilityReached`. */
  density: { from: IsoDate; share: number }[];
}

export interface CountForecast {
  mean: number;
  quantiles: Record<QuantileLevel, number>;
}

export interface MonthlyRow {
  monthEnd: IsoDate;
  randomised: CountForecast;
  events?: CountForecast;
}

export interface Caution {
  code: string;
  text: string;
  /** The sponsor's wording: counts, never a site's name. */
  sponsorText: string;
  /** Codes of the milestones whose dates the caution touches; empty: all. */
  milestones?: string[];
}

/** A forecast file (`format: "kalends-forecast/1"`). */
export interface Forecast {
  format: 'kalends-forecast/1';
  engineVersion: string;
  studySha256: string;
  seed: number;
  draws: number;
  dataCutoff: IsoDate;
  observed: { randomised: number; events: number | null; withdrawn: number | null; atRisk: number | null };
  fit: ForecastFit;
  milestones: MilestoneForecast[];
  monthly: MonthlyRow[];
  cautions: Caution[];
}
