import type { DataCutRow } from '../../entities/data-cut';
import type { CutHead, CutView } from './schema';

export function serialiseCutHead(row: DataCutRow, acceptedBy: string): CutHead {
  return {
    number: row.number,
    cutoffOn: row.cutoffOn,
    kind: row.kind,
    counts: row.counts,
    acceptedAt: row.acceptedAt.toISOString(),
    acceptedBy,
    differences: row.differences.length,
  };
}

export function serialiseCut(row: DataCutRow, acceptedBy: string, runs: number[]): CutView {
  return {
    ...serialiseCutHead(row, acceptedBy),
    aggregate: row.aggregate ?? null,
    differences: row.differences,
    note: row.note ?? null,
    file:
      row.fileSha256 && row.fileName ? { name: row.fileName, sha256: row.fileSha256, bytes: row.fileBytes ?? 0 } : null,
    runs,
  };
}
