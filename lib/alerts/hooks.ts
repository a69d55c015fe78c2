import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { callOperation } from '../http/client';
import {
  addAlertRuleOperation,
  changeAlertRuleOperation,
  deleteAlertRuleOperation,
  listAlertRulesOperation,
} from './operations';
import type { AddAlertRuleBody, AlertRules, ChangeAlertRuleBody } from './schema';

const rulesKey = (code: string) => ['alert-rules', code] as const;

export function useAlertRules(code: string, initialData: AlertRules) {
  return useQuery({
    queryKey: rulesKey(code),
    queryFn: ({ signal }) => callOperation(listAlertRulesOperation, { params: { code }, signal }),
    initialData,
    staleTime: 5_000,
  });
}

function useRefresh(code: string) {
  const client = useQueryClient();
  return () => client.invalidateQueries({ queryKey: rulesKey(code) });
}

export function useAddAlertRule(code: string) {
  return useMutation({
    mutationFn: (body: AddAlertRuleBody) => callOperation(addAlertRuleOperation, { params: { code }, body }),
    onSuccess: useRefresh(code),
  });
}

export function useChangeAlertRule(code: string) {
  return useMutation({
    mutationFn: ({ id, ...body }: ChangeAlertRuleBody & { id: string }) =>
      callOperation(changeAlertRuleOperation, { params: { code, id }, body }),
    onSettled: useRefresh(code),
  });
}

export function useDeleteAlertRule(code: string) {
  return useMutation({
    mutationFn: ({ id, version }: { id: string; version: number }) =>
      callOperation(deleteAlertRuleOperation, { params: { code, id }, query: { version } }),
    onSettled: useRefresh(code),
  });
}
