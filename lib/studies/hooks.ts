import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { callOperation } from '../http/client';
import {
  createStudyOperation,
  getPlanOperation,
  savePlanSectionOperation,
  savePlanVersionOperation,
} from './operations';
import type { CreateStudyBody, PlanView, SavePlanSectionBody, SavePlanVersionBody } from './schema';

const planKey = (code: string) => ['plan', code] as const;

export function usePlan(code: string, initialData: PlanView) {
  return useQuery({
    queryKey: planKey(code),
    queryFn: ({ signal }) => callOperation(getPlanOperation, { params: { code }, signal }),
    initialData,
    staleTime: 10_000,
  });
}

function useRefresh(code: string) {
  const client = useQueryClient();
  return () => client.invalidateQueries({ queryKey: planKey(code) });
}

export function useSavePlanSection(code: string) {
  return useMutation({
    mutationFn: (body: SavePlanSectionBody) => callOperation(savePlanSectionOperation, { params: { code }, body }),
    onSettled: useRefresh(code),
  });
}

export function useSavePlanVersion(code: string) {
  return useMutation({
    mutationFn: (body: SavePlanVersionBody) => callOperation(savePlanVersionOperation, { params: { code }, body }),
    onSettled: useRefresh(code),
  });
}

export function useCreateStudy() {
  return useMutation({
    mutationFn: (body: CreateStudyBody) => callOperation(createStudyOperation, { params: {}, body }),
  });
}
