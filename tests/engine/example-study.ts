import type { Site, Study, Subject } from '@/lib/engine/types';
import { toDayNumber, toIsoDate } from '@/lib/engine/calendar';
import { createGenerator } from '@/lib/engine/generator';

/**
 * An invented study with 64 sites and 1,200 patients, half of them in, built from the engine's own generator under a fixed seed:
 * the same in every run.
 */
export function exampleStudy(change: (study: Study) => void = () => {}): Study {
  const generator = createGenerator(2027);
  generator.startAt(0, 0, 0);
  const cutoff = toDayNumber('2027-03-31');
  const sites: Site[] = [];
  const subjects: Subject[] = [];
  for (let place = 0; place < 64; place += 1) {
    const code = String(101 + place);
    const country = ['PL', 'DE', 'ES', 'CZ'][place % 4] as string;
    if (place >= 52) {
      const earliest = cutoff + 10 + 5 * (place - 52);
      sites.push({
        code,
        country,
        cap: 40,
        planned: {
          earliest: toIsoDate(earliest),
          likely: toIsoDate(earliest + 30),
          latest: toIsoDate(earliest + 100),
        },
      });
      continue;
    }
    const activated = cutoff - 400 + Math.floor(generator.uniform() * 200);
    const rate = 0.2 + 0.9 * generator.uniform();
    let randomised = 0;
    for (let day = activated; ;) {
      day += Math.ceil((30.4375 * generator.exponential()) / rate);
      if (day > cutoff) break;
      randomised += 1;
      subjects.push(
        subject(
          `${code}-${String(randomised).padStart(3, '0')}`,
          code,
          day,
          cutoff,
          generator.exponential(),
          generator.exponential(),
        ),
      );
    }
    sites.push({ code, country, activatedOn: toIsoDate(activated), closedOn: null, cap: 40, randomised });
  }
  const study: Study = {
    format: 'kalends-study/1',
    study: { code: 'KLD-301', title: 'An invented study' },
    dataCutoff: '2027-03-31',
    enrolment: { target: 1200, rate: { meanPerMonth: 0.6, cv: 0.8, basis: 'data' }, sites },
    events: {
      model: { family: 'weibull', medianMonths: 20, shape: 1, basis: 'data', priorEvents: 5 },
      dropout: { perMonth: 0.02, basis: 'data', priorEvents: 5 },
      subjects,
    },
    milestones: [
      { code: 'IA', name: 'Interim analysis', kind: 'events', count: 288, plannedOn: '2028-01-31' },
      { code: 'FA', name: 'Final analysis', kind: 'events', count: 480 },
      { code: 'LPI', name: 'Last patient in', kind: 'randomised', count: 1200 },
      { code: 'FU12', name: '12-month follow-up', kind: 'follow-up', months: 12 },
      { code: 'PA', kind: 'all-of', of: ['FA', 'FU12'] },
    ],
    simulation: { draws: 1000, seed: 1, horizonMonths: 120 },
  };
  change(study);
  return study;
}

function subject(id: string, site: string, day: number, cutoff: number, toEvent: number, toLoss: number): Subject {
  const event = day + Math.floor(toEvent * 30.4375 * 29);
  const loss = day + Math.floor(toLoss * 30.4375 * 60);
  const status = Math.min(event, loss) > cutoff ? 'at-risk' : event <= loss ? 'event' : 'withdrawn';
  return {
    id,
    site,
    randomisedOn: toIsoDate(day),
    status,
    statusOn: toIsoDate(Math.min(event, loss, cutoff)),
  };
}
