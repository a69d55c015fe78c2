import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { runForecast, serialiseForecast } from '@/lib/engine/forecast';
import { parseStudyFile } from '@/lib/study-file/parse';
import { forecastFileSchema } from '@/lib/study-file/schema';
import { exampleStudy, exampleWith } from './example';

/** The command line as somebody runs it: a process of its own, its output streams and its exit code. */
function forecast(args: string[], input?: string) {
  // No database, no server: the environment names neither.
  const env = { ...process.env, DATABASE_URL: '', DATABASE_OWNER_URL: '', NODE_ENV: 'production' as const };
  const done = spawnSync('npm', ['run', '-s', 'forecast', '--', ...args], {
    input,
    env,
    encoding: 'utf8',
    maxBuffer: 64 * 1024 * 1024,
  });
  return { code: done.status, out: done.stdout, err: done.stderr };
}

let folder: string;
let file: string;
const text = `${JSON.stringify(exampleStudy(), null, 2)}\n`;

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'kalends-cli-'));
  file = join(folder, 'study.json');
  writeFileSync(file, text);
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

describe('npm run -s forecast', () => {
  it('prints the forecast file and nothing else, of the bytes read', () => {
    const { code, out } = forecast([file]);
    expect(code).toBe(0);
    expect(forecastFileSchema.parse(JSON.parse(out))).toMatchObject({
      studySha256: createHash('sha256').update(text).digest('hex'),
      draws: 500,
      seed: 1,
    });
    expect(out.endsWith('}\n')).toBe(true);
  });

  it('gives the same bytes with 1, 2 and 4 threads, from standard input, and as the engine alone does', () => {
    const [one, two, four] = [1, 2, 4].map((threads) => forecast([file, '--threads', String(threads)]).out);
    expect(two).toBe(one);
    expect(four).toBe(one);
    expect(forecast(['-'], text).out).toBe(one);
    const parsed = parseStudyFile(text);
    if (!parsed.ok) throw new Error('the example is valid');
    const studySha256 = createHash('sha256').update(text).digest('hex');
    expect(serialiseForecast(runForecast(parsed.study, { studySha256 }))).toBe(one);
  });

  it('takes draws and seed from the flags, and another seed gives another forecast', () => {
    const first = JSON.parse(forecast([file, '--draws', '300', '--seed', '7']).out);
    const second = JSON.parse(forecast([file, '--draws', '300', '--seed', '8']).out);
    expect(first).toMatchObject({ draws: 300, seed: 7 });
    expect(first.monthly).not.toEqual(second.monthly);
  });

  it('ends with 2 and one problem object that lists every fault', () => {
    writeFileSync(
      join(folder, 'bad.json'),
      JSON.stringify(exampleWith(['/enrolment/target', -1], ['/milestones/2/code', 'IA'])),
    );
    const { code, out, err } = forecast([join(folder, 'bad.json')]);
    expect(code).toBe(2);
    expect(out).toBe('');
    const problem = JSON.parse(err);
    expect(problem).toMatchObject({ status: 422 });
    expect(problem.errors.map((fault: { pointer: string }) => fault.pointer)).toEqual([
      '/enrolment/target',
      '/milestones/2/code',
    ]);
    expect(err).not.toMatch(/\n\s+at /);
  });

  it.each([
    ['no file', []],
    ['a file that is not there', ['/nonexistent/study.json']],
    ['a flag that is none', ['FILE', '--speed', '9']],
    ['draws that are no number', ['FILE', '--draws', 'many']],
    ['no draws', ['FILE', '--draws', '0']],
  ])('ends with 2 for %s', (_what, args) => {
    const { code, out, err } = forecast(args.map((arg) => (arg === 'FILE' ? file : arg)));
    expect(code).toBe(2);
    expect(out).toBe('');
    expect(JSON.parse(err).errors).toHaveLength(1);
  });
});
