/** Stands on every page, mail and export that shows a forecast. */
export const DEFERRAL_SENTENCE =
  "A forecast is not a decision. When the analyses take place rests with the protocol statistician, the protocol and statistical analysis plan, and the data monitoring committee's charter where there is one. Local rules and licensed practice come first.";

/** Stands on every page of a demonstration study. */
export const DEMONSTRATION_SENTENCE =
  'Invented data for demonstration: the study, people, sites and companies do not exist.';
