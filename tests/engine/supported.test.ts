import { describe, expect, it } from 'vitest';
import { prepareForecast } from '@/lib/engine/forecast';
import { unsupportedParts } from '@/lib/engine/supported';
import type { Study } from '@/lib/engine/types';
import { exampleStudy } from './example-study';
import { smallStudy } from './small-study';

function pointers(study: Study): string[] {
  return unsupportedParts(study).map(({ pointer }) => pointer);
}

describe('what the engine refuses', () => {
  it('nothing of a study that it can forecast', () => {
    expect(pointers(exampleStudy())).toEqual([]);
    expect(pointers(smallStudy())).toEqual([]);
  });

  it('all faults at once, each with a sentence', () => {
    const study = exampleStudy((draft) => {
      draft.enrolment.ageing = { basis: 'data', floor: 0.5, months: 8 };
      draft.enrolment.calendar = [{ from: '2027-07-01', to: '2027-08-15', multiplier: 0 }];
      draft.enrolment.countryCaps = [{ country: 'DE', cap: 150 }];
      draft.enrolment.screening = { days: 28, passed: 640, failed: 210 };
      if (draft.enrolment.sites[3]) draft.enrolment.sites[3].inScreening = 2;
      if (!draft.events) return;
      draft.events.model.family = 'average';
      draft.events.adjudication = { confirmed: 120, refuted: 8, medianLagDays: 45 };
      if (draft.events.subjects?.[5]) draft.events.subjects[5].status = 'event-pending';
    });
    expect(pointers(study)).toEqual([
      '/enrolment/ageing',
      '/enrolment/calendar',
      '/enrolment/countryCaps',
      '/enrolment/screening',
      '/enrolment/sites/3/inScreening',
      '/events/model/family',
      '/events/adjudication',
      '/events/subjects/5/status',
    ]);
    for (const { detail } of unsupportedParts(study)) expect(detail).toMatch(/^[A-Z].*\.$/);
    expect(() => prepareForecast(study)).toThrow('/enrolment/ageing');
  });

  it('empty lists are nothing to refuse', () => {
    expect(
      pointers(
        exampleStudy((draft) => {
          draft.enrolment.calendar = [];
          draft.enrolment.countryCaps = [];
        }),
      ),
    ).toEqual([]);
  });

  it('aggregate data with anything that needs to know who has been at risk for how long', () => {
    const study = exampleStudy((draft) => {
      if (!draft.events) return;
      delete draft.events.subjects;
      draft.events.aggregate = { events: 95, withdrawn: 20, atRisk: 505, personMonths: 4210.5 };
      draft.events.followUpMonths = 12;
    });
    expect(pointers(study)).toEqual(['/events/model/family', '/events/followUpMonths']);
  });

  it('a cured share with the exponential', () => {
    const study = exampleStudy((draft) => {
      if (draft.events) Object.assign(draft.events.model, { family: 'exponential', cureFraction: 0.2 });
    });
    expect(pointers(study)).toEqual(['/events/model/cureFraction']);
  });

  it('a posterior from neither events nor plan, and patients of whom nothing is known', () => {
    const study = exampleStudy((draft) => {
      if (!draft.events) return;
      draft.events.model.priorEvents = 0;
      delete draft.events.subjects;
    });
    expect(pointers(study)).toEqual(['/events/model/priorEvents', '/events/subjects']);
  });
});
