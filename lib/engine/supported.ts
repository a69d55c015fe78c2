import { FAMILY_NAMES } from './families';
import type { EventsPart, Study } from './types';

/** One part of a study file that this engine does not compute yet. */
export interface UnsupportedPart {
  /** JSON Pointer (RFC 6901) to the member. */
  pointer: string;
  /** A sentence that says what would be accepted. */
  detail: string;
}

/**
 * Everything in a study that the engine cannot forecast. Nothing is ever ignored silently: what is listed here is refused.
 *
 * @returns an empty list where the engine takes the study as it is
 */
export function unsupportedParts(study: Study): UnsupportedPart[] {
  const parts: UnsupportedPart[] = [];
  const refuse = (pointer: string, detail: string): void => {
    parts.push({ pointer, detail });
  };
  const { enrolment, events } = study;
  if (enrolment.ageing) {
    refuse('/enrolment/ageing', 'Ageing of sites is not supported; leave it out, and rates stay as they are.');
  }
  if (enrolment.calendar && enrolment.calendar.length > 0) {
    refuse(
      '/enrolment/calendar',
      'Calendar multipliers are not supported; leave them out, or use seasonality or closing dates.',
    );
  }
  if (enrolment.countryCaps && enrolment.countryCaps.length > 0) {
    refuse('/enrolment/countryCaps', 'Caps of countries are not supported; leave them out, or give caps to the sites.');
  }
  if (enrolment.screening) {
    refuse(
      '/enrolment/screening',
      'Patients in screening are not supported; leave this out, and inScreening of the sites.',
    );
  }
  enrolment.sites.forEach((site, place) => {
    if (site.inScreening !== undefined) {
      refuse(
        `/enrolment/sites/${place}/inScreening`,
        'Patients in screening are not supported; leave this out, and only randomised patients count.',
      );
    }
  });
  if (events) refuseEvents(study, events, refuse);
  return parts;
}

function refuseEvents(study: Study, events: EventsPart, refuse: (pointer: string, detail: string) => void): void {
  const { model, aggregate, subjects } = events;
  const known = FAMILY_NAMES.includes(model.family);
  if (!known) {
    refuse(
      '/events/model/family',
      `The family “${model.family}” is not supported; choose ${FAMILY_NAMES.join(' or ')}.`,
    );
  } else if (aggregate && model.family !== 'exponential') {
    refuse(
      '/events/model/family',
      'With aggregate data only the exponential is possible, because who has been at risk for how long is not known; choose exponential, or give the subjects.',
    );
  }
  if ((model.cureFraction ?? 0) > 0 && model.family === 'exponential') {
    refuse(
      '/events/model/cureFraction',
      'A cure fraction is supported with the Weibull only; choose weibull, or set 0.',
    );
  }
  if (aggregate && events.followUpMonths) {
    refuse(
      '/events/followUpMonths',
      'A fixed follow-up needs the subjects, because with aggregate data who has been at risk for how long is not known; give the subjects, or null.',
    );
  }
  if (events.adjudication) {
    refuse('/events/adjudication', 'Adjudication is not supported; leave it out, and every reported event counts.');
  }
  (subjects ?? []).forEach((subject, place) => {
    if (subject.status !== 'event-pending') return;
    refuse(
      `/events/subjects/${place}/status`,
      'Events that await adjudication are not supported; give “event” once it is confirmed, “at-risk” until then.',
    );
  });
  refuseWithoutEvidence(study, events, refuse);
}

function refuseWithoutEvidence(
  study: Study,
  events: EventsPart,
  refuse: (pointer: string, detail: string) => void,
): void {
  const { model, aggregate, subjects } = events;
  const seen = aggregate?.events ?? (subjects ?? []).filter(({ status }) => status === 'event').length;
  if (model.basis === 'data' && model.priorEvents === 0 && seen === 0) {
    refuse(
      '/events/model/priorEvents',
      'Without an event in the data, basis “data” needs the plan to have some weight; give a number above 0.',
    );
  }
  const randomised = study.enrolment.sites.reduce((sum, site) => sum + (site.randomised ?? 0), 0);
  if (!aggregate && !subjects && randomised > 0) {
    refuse(
      '/events/subjects',
      'Patients are randomised already, so what became of them is needed: give subjects, or aggregate in place of it.',
    );
  }
}
