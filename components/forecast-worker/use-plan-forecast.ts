'use client';

import { useEffect, useRef, useState } from 'react';
import type { ForecastAnswer, ForecastQuestion } from '@/components/forecast-worker/messages';
import type { Forecast, Study } from '@/lib/engine/types';

export interface PlanForecast {
  /** The last picture; it stays while the next one is drawn. */
  forecast: Forecast | null;
  drawsDone: number;
  state: 'idle' | 'drawing' | 'done' | 'error';
  error: string | null;
}

const NOTHING: PlanForecast = { forecast: null, drawsDone: 0, state: 'idle', error: null };
/** A first look while the hand is still on the field, then a steadier one. */
const DRAWS = [250, 1000];
const PAUSE_MS = 120;

/** The forecast of a plan as it is typed, computed in a Web Worker. `null`: there is nothing to compute yet. */
export function usePlanForecast(study: Study | null): PlanForecast {
  const [result, setResult] = useState<PlanForecast>(NOTHING);
  const worker = useRef<Worker | null>(null);
  const asked = useRef(0);
  // Typing makes new objects of equal value; only another value asks again.
  const key = study ? JSON.stringify(study) : null;

  useEffect(() => {
    const made = new Worker(new URL('./forecast.worker.ts', import.meta.url), { type: 'module' });
    made.onmessage = ({ data }: MessageEvent<ForecastAnswer>): void => {
      if (data.number !== asked.current) return;
      if (data.kind === 'error') return setResult((last) => ({ ...last, state: 'error', error: data.message }));
      const { forecast, isLast } = data;
      setResult({ forecast, drawsDone: forecast.draws, state: isLast ? 'done' : 'drawing', error: null });
    };
    made.onerror = (): void =>
      setResult((last) => ({ ...last, state: 'error', error: 'The preview could not be computed here.' }));
    worker.current = made;
    return () => made.terminate();
  }, []);

  useEffect(() => {
    asked.current += 1;
    const number = asked.current;
    const timer = setTimeout(() => {
      if (key === null) return setResult(NOTHING);
      setResult((last) => ({ ...last, state: 'drawing', error: null }));
      const question: ForecastQuestion = { number, study: JSON.parse(key) as Study, draws: DRAWS };
      worker.current?.postMessage(question);
    }, PAUSE_MS);
    return () => clearTimeout(timer);
  }, [key]);

  return result;
}
