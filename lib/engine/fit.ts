import type { EventsModel } from './events-model';
import { maximiseEnrolment } from './enrolment-likelihood';
import type { PreparedForecast } from './forecast';
import type { ForecastFit } from './types';

/** Maximum-likelihood figures, without prior and whatever the basis; null where there is nothing to fit. */
export function fitForecast({ enrolment, events }: PreparedForecast): ForecastFit {
  return { enrolment: maximiseEnrolment(enrolment.sites), events: fitEvents(events), dropout: fitDropout(events) };
}

function fitEvents(events: EventsModel | null): ForecastFit['events'] {
  if (!events || !(events.data.exposure > 0)) return null;
  const fit = events.family.fit(events.data, events.cureFraction);
  return fit && [fit];
}

function fitDropout(events: EventsModel | null): ForecastFit['dropout'] {
  if (!events || !(events.data.exposure > 0)) return null;
  return { perMonth: events.observed.withdrawn / events.data.exposure };
}
