import { z } from 'zod';

/** Every kind of job: its payload, how long one attempt may take, how often it is tried. Handlers are in `registry.ts`. */
export const QUEUES = {
  /** Computes a forecast run. Long enough for the largest study; a killed worker's run is taken up again after it. */
  'forecast-run': {
    payload: z.strictObject({ organisationId: z.uuid(), runId: z.uuid() }),
    options: { expireInSeconds: 900, retryLimit: 5, retryDelay: 1, retryBackoff: false },
  },
  /**
   * Hands one message to the mail relay. Short, so that a killed worker's mail is soon tried again; tried for half a day, so
   * that a relay may be down over night.
   */
  'mail-deliver': {
    payload: z.strictObject({ organisationId: z.uuid(), messageId: z.uuid() }),
    options: { expireInSeconds: 60, retryLimit: 13, retryDelay: 5, retryBackoff: true },
  },
} as const;

export type QueueName = keyof typeof QUEUES;
export type JobPayload<Q extends QueueName> = z.infer<(typeof QUEUES)[Q]['payload']>;
