import { performance } from 'node:perf_hooks';
import { prepareForecast, runForecast } from '@/lib/engine/forecast';
import type { Study } from '@/lib/engine/types';
import { createWorkerPool } from '@/lib/jobs/worker-pool';
import { demoStudyFile } from '@/scripts/demo/study-file';

/**
 * `npm run bench`: how the engine's parts compare within one run. Absolute times are the machine's; the ratios are ours. Each
 * figure is the median of five.
 */
const REPEATS = 5;

async function median(work: () => unknown): Promise<number> {
  const times: number[] = [];
  for (let turn = 0; turn < REPEATS; turn += 1) {
    const started = performance.now();
    await work();
    times.push(performance.now() - started);
  }
  return times.sort((a, b) => a - b)[Math.floor(REPEATS / 2)]!;
}

const withDraws = (study: Study, draws: number): Study => ({ ...study, simulation: { ...study.simulation, draws } });
const exponential = (study: Study): Study =>
  study.events
    ? { ...study, events: { ...study.events, model: { ...study.events.model, family: 'exponential' } } }
    : study;
const enrolmentOnly = ({ events: _events, ...study }: Study): Study => ({
  ...study,
  milestones: study.milestones.filter(({ kind }) => kind === 'randomised'),
});

const study = demoStudyFile();
const thousand = withDraws(study, 1000);
const run = (input: Study) => median(() => runForecast(input, { studySha256: '' }));

// What a thousand draws of the same study cost when nothing but the logarithm of as many numbers is taken: the floor.
const numbers = 1000 * 1200 * 3;
const floor = await median(() => {
  let sum = 0;
  for (let count = 1; count <= numbers; count += 1) sum += Math.log(count / numbers);
  return sum;
});

const whole = await run(thousand);
const rows: [string, number][] = [
  ['1,000 draws, Weibull', whole],
  ['1,000 draws, exponential', await run(exponential(thousand))],
  ['1,000 draws, enrolment only', await run(enrolmentOnly(thousand))],
  ['preparing (fits and grids)', await median(() => prepareForecast(thousand))],
  ['3.6 million logarithms, the floor', floor],
];
process.stdout.write('The demonstration’s study, 64 sites and 1,200 patients\n');
for (const [name, time] of rows) {
  process.stdout.write(
    `${name.padEnd(36)}${time.toFixed(1).padStart(9)} ms${(time / whole).toFixed(2).padStart(8)} of the first row\n`,
  );
}

const ten = withDraws(study, 10_000);
const threads: number[] = [];
for (const count of [1, 2]) {
  const pool = await createWorkerPool(count);
  await pool.run(thousand, { studySha256: '' });
  threads.push(await median(() => pool.run(ten, { studySha256: '' })));
  await pool.close();
}
const [one = 0, two = 0] = threads;
process.stdout.write(
  `10,000 draws: 1 thread ${one.toFixed(0)} ms, 2 threads ${two.toFixed(0)} ms, ${(one / two).toFixed(2)} times as fast\n`,
);
