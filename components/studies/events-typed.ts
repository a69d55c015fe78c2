import { asPercent, shareTyped } from '@/components/studies/enrolment-typed';
import { numberTyped } from '@/components/ui/number-typed';
import type { Plan } from '@/lib/studies/schema';

/** What stands in the fields of step 5. */
export interface EventsTyped {
  /** A study may have only an enrolment target. */
  counted: 'yes' | 'no';
  medianMonths: string;
  family: string;
  shape: string;
  /** Those who never have the event, with the Weibull only. */
  curePercent: string;
  basis: 'plan' | 'data';
  priorEvents: string;
  lossPercent: string;
  lossPrior: string;
  followUpMonths: string;
}

export const EMPTY_EVENTS: EventsTyped = {
  counted: 'yes',
  medianMonths: '',
  family: 'exponential',
  shape: '1',
  curePercent: '0',
  basis: 'data',
  priorEvents: '5',
  lossPercent: '',
  lossPrior: '5',
  followUpMonths: '',
};

type Events = NonNullable<Plan['events']>;

/** `saved` is null both where nothing was saved and where "no events" was; `isSaved` tells them apart. */
export function eventsTyped(saved: Events | null, isSaved: boolean): EventsTyped {
  if (!saved) return isSaved ? { ...EMPTY_EVENTS, counted: 'no' } : EMPTY_EVENTS;
  const { model, dropout, followUpMonths } = saved;
  return {
    counted: 'yes',
    medianMonths: String(model.medianMonths),
    family: model.family,
    shape: String(model.shape ?? 1),
    curePercent: asPercent(model.cureFraction ?? 0),
    basis: model.basis,
    priorEvents: String(model.priorEvents),
    lossPercent: asPercent(dropout.perMonth),
    lossPrior: String(dropout.priorEvents),
    followUpMonths: followUpMonths ? String(followUpMonths) : '',
  };
}

/** Adjudication has no field here and stays as it was saved. */
export function eventsValue(typed: EventsTyped, saved: Events | null): unknown {
  if (typed.counted === 'no') return null;
  const cureFraction = shareTyped(typed.curePercent) ?? 0;
  const adjudication = saved?.adjudication;
  return {
    model: {
      family: typed.family,
      medianMonths: numberTyped(typed.medianMonths),
      ...(typed.family === 'weibull' && { shape: numberTyped(typed.shape) }),
      ...(typed.family === 'weibull' && cureFraction !== 0 && { cureFraction }),
      basis: typed.basis,
      priorEvents: numberTyped(typed.priorEvents),
    },
    dropout: {
      perMonth: shareTyped(typed.lossPercent),
      basis: typed.basis,
      priorEvents: numberTyped(typed.lossPrior),
    },
    followUpMonths: numberTyped(typed.followUpMonths),
    ...(adjudication && { adjudication }),
  };
}

const FIELDS: Record<string, string> = {
  'model.family': 'family',
  'model.medianMonths': 'medianMonths',
  'model.shape': 'shape',
  'model.cureFraction': 'curePercent',
  'model.basis': 'basis',
  'model.priorEvents': 'priorEvents',
  'dropout.perMonth': 'lossPercent',
  'dropout.basis': 'basis',
  'dropout.priorEvents': 'lossPrior',
};

export function eventsField(path: string): string {
  return FIELDS[path] ?? path;
}
