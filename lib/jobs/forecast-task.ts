import type { MessagePort } from 'node:worker_threads';
import { chunkCount, prepareForecast, simulateChunk, transferables } from '../engine/forecast';
import type { Study } from '../engine/types';

/** What one thread gets: the study, a port to send chunks through, and two words that all threads of the run share. */
export interface ForecastTask {
  study: Study;
  port: MessagePort;
  /** `[next chunk, stop]`: threads take the next chunk that nobody has taken, until none is left or they are told to stop. */
  shared: Int32Array;
}

/** A thread's work on a run. Which thread takes which chunk does not matter: a chunk's draws depend on its number alone. */
export default function runTask({ study, port, shared }: ForecastTask): number {
  const prepared = prepareForecast(study);
  const chunks = chunkCount(prepared.draws);
  let done = 0;
  try {
    while (Atomics.load(shared, 1) === 0) {
      const chunk = Atomics.add(shared, 0, 1);
      if (chunk >= chunks) break;
      const result = simulateChunk(prepared, chunk);
      port.postMessage(result, transferables(result) as ArrayBuffer[]);
      done += 1;
    }
  } finally {
    port.postMessage(null);
    port.close();
  }
  return done;
}
