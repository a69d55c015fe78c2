import { Button } from '@/components/ui/button';
import { Notice } from '@/components/ui/notice';
import { Cell, HeadCell, Row, RowHead, Table, TableBody, TableHead } from '@/components/ui/table';
import { countryName } from '@/lib/countries';
import { formatDate } from '@/lib/format';
import type { SiteField, SiteInput, SiteView } from '@/lib/sites/schema';

const NAMES: Record<SiteField, string> = {
  code: 'Code',
  name: 'Name',
  city: 'City',
  country: 'Country',
  plannedEarliest: 'Earliest',
  plannedLikely: 'Likely',
  plannedLatest: 'Latest',
  activatedOn: 'Activated on',
  closedOn: 'Closed on',
  cap: 'Cap',
};

function shown(field: SiteField, value: string | number | null): string {
  if (value === null) return 'empty';
  if (field === 'country') return countryName(String(value));
  return /On$|^planned/.test(field) ? formatDate(String(value)) : String(value);
}

interface SiteConflictProps {
  mine: SiteInput;
  current: SiteView;
  onKeep: () => void;
  onTake: () => void;
}

/** Somebody else saved this site meanwhile: both values of every field in which the two differ. */
export function SiteConflict({ mine, current, onKeep, onTake }: SiteConflictProps) {
  const differing = (Object.keys(NAMES) as SiteField[]).filter((field) => mine[field] !== current[field]);
  return (
    <Notice
      live
      tone="caution"
      title={`Someone else changed site ${current.code} while you were working on it.`}
      action={
        <>
          <Button size="small" onClick={onKeep}>
            Keep mine
          </Button>
          <Button size="small" variant="second" onClick={onTake}>
            Take what stands now
          </Button>
        </>
      }
    >
      <Table dense caption="Both values">
        <TableHead>
          <Row>
            <HeadCell>Field</HeadCell>
            <HeadCell>Stands now</HeadCell>
            <HeadCell>Yours</HeadCell>
          </Row>
        </TableHead>
        <TableBody>
          {differing.map((field) => (
            <Row key={field}>
              <RowHead>{NAMES[field]}</RowHead>
              <Cell>{shown(field, current[field])}</Cell>
              <Cell className="font-600">{shown(field, mine[field])}</Cell>
            </Row>
          ))}
        </TableBody>
      </Table>
    </Notice>
  );
}
