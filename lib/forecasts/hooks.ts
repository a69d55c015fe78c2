import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { callOperation } from '../http/client';
import { cancelForecastOperation, getRunOperation, requestForecastOperation } from './operations';
import { POLL_MILLISECONDS, type RequestForecastBody, type RunView } from './schema';

const runKey = (code: string, number: number) => ['run', code, number] as const;

export const isUnderWay = (run: Pick<RunView, 'status'>): boolean =>
  run.status === 'queued' || run.status === 'running';

/** A run under way is asked after once a second, until it has ended. */
export function useRun(code: string, initialData: RunView) {
  const { number } = initialData;
  return useQuery({
    queryKey: runKey(code, number),
    queryFn: ({ signal }) => callOperation(getRunOperation, { params: { code, number }, signal }),
    initialData,
    staleTime: 0,
    refetchOnMount: false,
    refetchOnWindowFocus: ({ state }) => state.data !== undefined && isUnderWay(state.data),
    refetchInterval: ({ state }) => (state.data && isUnderWay(state.data) ? POLL_MILLISECONDS : false),
  });
}

export function useRequestForecast(code: string) {
  return useMutation({
    mutationFn: (body: Partial<RequestForecastBody>) =>
      callOperation(requestForecastOperation, { params: { code }, body }),
  });
}

export function useCancelForecast(code: string, number: number) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: () => callOperation(cancelForecastOperation, { params: { code, number } }),
    // Cancelled or ended meanwhile: what stands is asked for either way.
    onSettled: () => client.invalidateQueries({ queryKey: runKey(code, number) }),
  });
}
