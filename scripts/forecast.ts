import { createHash } from 'node:crypto';
import { readFileSync } from 'node:fs';
import { availableParallelism } from 'node:os';
import { parseArgs } from 'node:util';
import { serialiseForecast } from '@/lib/engine/forecast';
import type { Study } from '@/lib/engine/types';
import { createWorkerPool } from '@/lib/jobs/worker-pool';
import type { StudyFileFault } from '@/lib/study-file/faults';
import { LIMITS } from '@/lib/study-file/limits';
import { parseStudyFile } from '@/lib/study-file/parse';

/**
 * The command line: a study file in, a forecast file out, and nothing else on standard output.
 *
 *     npm run -s forecast -- FILE [--draws N] [--seed S] [--threads N]
 */
const USAGE = 'npm run -s forecast -- FILE [--draws N] [--seed S] [--threads N]';

/** Ends with everything that is wrong, as problem details (RFC 9457). */
function refuse(detail: string, errors: StudyFileFault[]): never {
  const title = 'Not a valid study file';
  process.stderr.write(`${JSON.stringify({ type: 'about:blank', title, status: 422, detail, errors }, null, 2)}\n`);
  process.exit(2);
}

interface Flags {
  file: string;
  draws: number | undefined;
  seed: number | undefined;
  threads: number;
}

function readFlags(): Flags {
  const faults: StudyFileFault[] = [];
  const whole = (name: string, text: string | undefined, least: number, most: number): number | undefined => {
    if (text === undefined) return undefined;
    const value = Number(text);
    if (/^\d+$/.test(text) && value >= least && value <= most) return value;
    faults.push({ pointer: '', detail: `--${name} takes a whole number from ${least} to ${most}, not “${text}”.` });
    return undefined;
  };
  try {
    const { values, positionals } = parseArgs({
      allowPositionals: true,
      options: { draws: { type: 'string' }, seed: { type: 'string' }, threads: { type: 'string' } },
    });
    const flags = {
      file: positionals[0] ?? '',
      draws: whole('draws', values.draws, 1, LIMITS.draws),
      seed: whole('seed', values.seed, 0, 4_294_967_295),
      threads: whole('threads', values.threads, 1, 256) ?? availableParallelism(),
    };
    if (positionals.length !== 1) faults.push({ pointer: '', detail: `Give one study file: ${USAGE}` });
    if (faults.length === 0) return flags;
  } catch (error) {
    faults.push({ pointer: '', detail: `${(error as Error).message.split('.')[0]}. ${USAGE}` });
  }
  return refuse('The command was not understood.', faults);
}

function readStudy(file: string): { study: Study; studySha256: string } {
  let bytes: Uint8Array;
  try {
    bytes = readFileSync(file === '-' ? 0 : file);
  } catch {
    return refuse('The study file could not be read.', [
      {
        pointer: '',
        detail: `There is no readable file ${file}. Give the path of a study file, or - for standard input.`,
      },
    ]);
  }
  const parsed = parseStudyFile(bytes);
  if (parsed.ok) return { study: parsed.study, studySha256: createHash('sha256').update(bytes).digest('hex') };
  const { errors } = parsed;
  return refuse(errors.length === 1 ? errors[0]!.detail : `${errors.length} things need to be put right.`, errors);
}

/** A bar where somebody is watching, a line at the end where nobody is. */
function showProgress(draws: number): (done: number) => void {
  if (!process.stderr.isTTY) return (done) => void (done === draws && process.stderr.write(`${done} draws\n`));
  return (done) => {
    const filled = Math.round((30 * done) / draws);
    process.stderr.write(
      `\r${'█'.repeat(filled)}${'·'.repeat(30 - filled)} ${done} of ${draws} draws${done === draws ? '\n' : ''}`,
    );
  };
}

const flags = readFlags();
const { study, studySha256 } = readStudy(flags.file);
study.simulation.draws = flags.draws ?? study.simulation.draws;
study.simulation.seed = flags.seed ?? study.simulation.seed;
const pool = await createWorkerPool(flags.threads);
try {
  const forecast = await pool.run(study, { studySha256, onProgress: showProgress(study.simulation.draws) });
  process.stdout.write(serialiseForecast(forecast));
} finally {
  await pool.close();
}
