import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { toDayNumber, toIsoDate } from '@/lib/engine/calendar';
import { runForecast } from '@/lib/engine/forecast';
import type { Study } from '@/lib/engine/types';
import { parseStudyFile } from '@/lib/study-file/parse';
import { checkValue, readCsv } from './check-values';
import { buildUdcaStudy, eventsBy, udcaPatients } from './udca-study';

const patients = udcaPatients(readCsv('udca_patients.csv'));
const file = readFileSync(new URL('./data/udca-study.json', import.meta.url), 'utf8');
const study = JSON.parse(file) as Study;

/** The truth, from the trial's own patients (Lindor et al. 1994, Gastroenterology 106:1284; R’s survival::udca). */
describe('the UDCA trial, forecast as it stood on 1 July 1990 (moved to 2018), while enrolling', () => {
  const forecast = runForecast(study, { studySha256: '' });

  it('the study file is what the patients’ data give', async () => {
    const built = buildUdcaStudy(patients, '2018-07-01');
    await expect(`${JSON.stringify(built, null, 2)}
`).toMatchFileSnapshot('./data/udca-study.json');
  });

  it('the study file is one that the command line takes', () => {
    expect(parseStudyFile(file)).toMatchObject({ ok: true });
  });

  it('what was known at the cut', () => {
    const { expected } = checkValue<
      unknown,
      { at_cut: Record<'enrolled' | 'events' | 'at_risk' | 'left_without_event', number> }
    >('R-replay-udca-events-1');
    expect(forecast.observed).toEqual({
      randomised: expected.at_cut.enrolled,
      events: expected.at_cut.events,
      withdrawn: expected.at_cut.left_without_event,
      atRisk: expected.at_cut.at_risk,
    });
  });

  it.each(['2018-12-31', '2019-06-30', '2020-06-30'])(
    'events that had happened by %s lie inside their 95 % band',
    (day) => {
      const row = forecast.monthly.find(({ monthEnd }) => monthEnd === day);
      const truth = eventsBy(patients, toDayNumber(day));
      expect(row?.events?.quantiles['0.025']).toBeLessThanOrEqual(truth);
      expect(row?.events?.quantiles['0.975']).toBeGreaterThanOrEqual(truth);
    },
  );

  it.each(['E37', 'E57'])('%s: the day on which it came lies inside its 95 % band', (code) => {
    const milestone = forecast.milestones.find((candidate) => candidate.code === code);
    const days = patients.filter(({ event }) => event).map(({ last }) => last);
    const truth = toIsoDate(days.sort((a, b) => a - b)[(milestone?.count ?? 0) - 1] as number);
    expect(milestone?.count).toBeGreaterThan(forecast.observed.events ?? 0);
    expect((milestone?.quantiles['0.025'] ?? '9') <= truth).toBe(true);
    expect((milestone?.quantiles['0.975'] ?? '0') >= truth).toBe(true);
  });

  it('control: the exponential, which takes no account of the time on study, has the truth of two years later above its 80 % band', () => {
    const wrong: Study = structuredClone(study);
    if (wrong.events) wrong.events.model.family = 'exponential';
    const row = runForecast(wrong, { studySha256: '' }).monthly.find(({ monthEnd }) => monthEnd === '2020-06-30');
    expect(row?.events?.quantiles['0.9']).toBeLessThan(eventsBy(patients, toDayNumber('2020-06-30')));
  });
});
