/** The ledger's columns, in the order in which they are typed. */
export const LOG_FIELDS = ['screened', 'failed', 'randomised', 'events', 'withdrawn'] as const;
export type LogField = (typeof LOG_FIELDS)[number];

export const CORRECTION_REASONS = ['typing-error', 'wrong-month', 'source-corrected', 'late-information', 'other'] as const;
export type CorrectionReason = (typeof CORRECTION_REASONS)[number];
