import { availableParallelism } from 'node:os';
import { MessageChannel } from 'node:worker_threads';
import Piscina from 'piscina';
import { type ChunkResult, ForecastCancelled, prepareForecast } from '../engine/forecast';
import { startTally, summariseTally, tallyChunk } from '../engine/summarise';
import type { Forecast, Study } from '../engine/types';
import type { ForecastTask } from './forecast-task';
import { taskBundle } from './task-bundle';

export interface RunOptions {
  /** SHA-256 of the study file's bytes, hexadecimal. */
  studySha256: string;
  onProgress?: (drawsDone: number) => void;
  /** Aborting ends the run with `ForecastCancelled`; the threads stop after the chunk at hand. */
  signal?: AbortSignal;
}

export interface WorkerPool {
  threads: number;
  run(study: Study, options: RunOptions): Promise<Forecast>;
  close(): Promise<void>;
}

/** Threads that compute forecasts. The same study gives the same forecast, byte for byte, with any number of them. */
export async function createWorkerPool(threads = availableParallelism()): Promise<WorkerPool> {
  const pool = new Piscina({ filename: await taskBundle(), minThreads: 0, maxThreads: threads, idleTimeout: 10_000 });
  return {
    threads,
    run: (study, options) => runOn(pool, threads, study, options),
    close: () => pool.close({ force: true }),
  };
}

async function runOn(pool: Piscina, threads: number, study: Study, options: RunOptions): Promise<Forecast> {
  const { studySha256, onProgress, signal } = options;
  const prepared = prepareForecast(study);
  const tally = startTally(prepared);
  const shared = new Int32Array(new SharedArrayBuffer(8));
  const stop = (): void => void Atomics.store(shared, 1, 1);
  if (signal?.aborted) stop();
  signal?.addEventListener('abort', stop, { once: true });
  try {
    await Promise.all(
      Array.from({ length: threads }, () =>
        runThread(pool, study, shared, (chunk) => {
          tallyChunk(tally, chunk);
          onProgress?.(tally.draws);
        }),
      ),
    );
  } catch (error) {
    // One thread's failure is the run's: the others need not go on.
    stop();
    throw error;
  } finally {
    signal?.removeEventListener('abort', stop);
  }
  if (signal?.aborted) throw new ForecastCancelled('The forecast was cancelled.');
  return summariseTally(prepared, tally, { studySha256 });
}

/** One thread's part: its chunks arrive through a port, and all of them before the part counts as done. */
async function runThread(
  pool: Piscina,
  study: Study,
  shared: Int32Array,
  take: (chunk: ChunkResult) => void,
): Promise<void> {
  const { port1, port2 } = new MessageChannel();
  const received = new Promise<void>((finish, fail) => {
    port1.on('message', (chunk: ChunkResult | null) => {
      if (chunk === null) return finish();
      try {
        take(chunk);
      } catch (error) {
        fail(error);
      }
    });
  });
  try {
    const task: ForecastTask = { study, port: port2, shared };
    await pool.run(task, { transferList: [port2] });
    await received;
  } finally {
    port1.close();
  }
}
