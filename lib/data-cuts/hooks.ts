import { useMutation } from '@tanstack/react-query';
import { callOperation } from '../http/client';
import { acceptAggregateOperation, acceptCutOperation, previewCutOperation } from './operations';
import type { AcceptAggregateBody } from './schema';

export function usePreviewCut(code: string) {
  return useMutation({
    mutationFn: ({ file, cutoffOn }: { file: File; cutoffOn: string }) =>
      callOperation(previewCutOperation, { params: { code }, file, body: { cutoffOn } }),
  });
}

export function useAcceptCut(code: string) {
  return useMutation({
    mutationFn: ({ file, ...body }: { file: File; cutoffOn: string; note: string }) =>
      callOperation(acceptCutOperation, { params: { code }, file, body }),
  });
}

export function useAcceptAggregate(code: string) {
  return useMutation({
    mutationFn: (body: AcceptAggregateBody) => callOperation(acceptAggregateOperation, { params: { code }, body }),
  });
}
