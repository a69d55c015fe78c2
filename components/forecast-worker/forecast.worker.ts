import type { ForecastAnswer, ForecastQuestion } from '@/components/forecast-worker/messages';
import { ForecastCancelled, runForecast } from '@/lib/engine/forecast';

/** The engine in the browser: the same code, seed and draws as on the server, hence the same numbers. */
let newest = 0;

/** Lets a newer question arrive between two answers. */
const breathe = (): Promise<void> => new Promise((resume) => setTimeout(resume, 0));

self.onmessage = async ({ data }: MessageEvent<ForecastQuestion>): Promise<void> => {
  newest = data.number;
  const answer = (message: ForecastAnswer): void => self.postMessage(message);
  for (const [place, draws] of data.draws.entries()) {
    await breathe();
    if (data.number !== newest) return;
    try {
      const study = { ...data.study, simulation: { ...data.study.simulation, draws } };
      // A picture on a page, not a file: nothing was hashed.
      const forecast = runForecast(study, { studySha256: '', cancelled: () => data.number !== newest });
      answer({ number: data.number, kind: 'forecast', forecast, isLast: place === data.draws.length - 1 });
    } catch (error) {
      if (error instanceof ForecastCancelled) return;
      answer({ number: data.number, kind: 'error', message: (error as Error).message });
      return;
    }
  }
};
