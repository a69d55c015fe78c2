import { useMutation } from '@tanstack/react-query';
import { callOperation } from '../http/client';
import { acceptSiteListOperation, previewSiteListOperation } from './operations';

export function usePreviewSiteList(code: string) {
  return useMutation({
    mutationFn: (file: File) => callOperation(previewSiteListOperation, { params: { code }, file }),
  });
}

export function useAcceptSiteList(code: string) {
  return useMutation({
    mutationFn: (file: File) => callOperation(acceptSiteListOperation, { params: { code }, file }),
  });
}
