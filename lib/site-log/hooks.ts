import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { callOperation } from '../http/client';
import { correctMonthOperation, getMonthSheetOperation, logMonthOperation } from './operations';
import type { CorrectMonthBody, LogMonthBody, MonthEntry, MonthSheet } from './schema';

const sheetKey = (code: string, site: string) => ['month-sheet', code, site] as const;

export function useMonthSheetQuery(code: string, site: string, initialData: MonthSheet) {
  return useQuery({
    queryKey: sheetKey(code, site),
    queryFn: ({ signal }) => callOperation(getMonthSheetOperation, { params: { code, site }, signal }),
    initialData,
    staleTime: 10_000,
  });
}

/** Puts a month as the server holds it into the sheet on show. */
export function useReplaceMonth(code: string, site: string) {
  const client = useQueryClient();
  return (entry: MonthEntry) =>
    client.setQueryData<MonthSheet>(sheetKey(code, site), (sheet) =>
      sheet ? { ...sheet, months: sheet.months.map((month) => (month.month === entry.month ? entry : month)) } : sheet,
    );
}

// A request that can't leave is not queued by the library: the sheet keeps the figures itself, over a reload too.
const networkMode = 'always';

export function useLogMonth(code: string, site: string) {
  const replace = useReplaceMonth(code, site);
  return useMutation({
    networkMode,
    mutationFn: ({ month, ...body }: LogMonthBody & { month: string }) =>
      callOperation(logMonthOperation, { params: { code, site, month }, body }),
    onSuccess: replace,
  });
}

export function useCorrectMonth(code: string, site: string) {
  const replace = useReplaceMonth(code, site);
  return useMutation({
    networkMode,
    mutationFn: ({ month, ...body }: CorrectMonthBody & { month: string }) =>
      callOperation(correctMonthOperation, { params: { code, site, month }, body }),
    onSuccess: replace,
  });
}
