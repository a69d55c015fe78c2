import { useMutation } from '@tanstack/react-query';
import { callOperation } from '../http/client';
import { acknowledgeOperation, publishForecastOperation } from './operations';
import type { PublishBody } from './schema';

export function usePublishForecast(code: string) {
  return useMutation({
    mutationFn: (body: PublishBody) => callOperation(publishForecastOperation, { params: { code }, body }),
  });
}

export function useAcknowledge(code: string, number: number) {
  return useMutation({ mutationFn: () => callOperation(acknowledgeOperation, { params: { code, number } }) });
}
