import type { PublicationRow } from '../../entities/publication';
import type { MilestoneForecast } from '../engine/types';
import type { Acknowledgement, PublicationHead, PublicationView } from './schema';

interface Around {
  publishedBy: string;
  supersededBy: { number: number; publishedAt: Date } | null;
  acknowledgedAt: Date | null;
  acknowledgements: Acknowledgement[] | null;
}

export function serialisePublication(row: PublicationRow, around: Around): PublicationView {
  return {
    number: row.number,
    publishedAt: row.publishedAt.toISOString(),
    publishedBy: around.publishedBy,
    note: row.note,
    content: row.content,
    auditDigest: row.auditDigest,
    supersededBy: around.supersededBy && {
      number: around.supersededBy.number,
      publishedAt: around.supersededBy.publishedAt.toISOString(),
    },
    acknowledgedAt: around.acknowledgedAt?.toISOString() ?? null,
    acknowledgements: around.acknowledgements,
  };
}

/** The same without what only one publication's own page shows. */
export function serialiseHead(row: PublicationRow, publishedBy: string): PublicationHead {
  return {
    number: row.number,
    publishedAt: row.publishedAt.toISOString(),
    publishedBy,
    note: row.note,
    dataCutoff: row.content.dataCutoff,
    runNumber: row.content.runNumber,
    milestones: row.content.milestones.map(withoutDensity),
  };
}

function withoutDensity({ density: _, ...rest }: MilestoneForecast): Omit<MilestoneForecast, 'density'> {
  return rest;
}
