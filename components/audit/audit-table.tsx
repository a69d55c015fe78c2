import { actionWords, valueWords } from '@/components/audit/audit-words';
import { Cell, HeadCell, Row, RowHead, SubLine, Table, TableBody, TableHead } from '@/components/ui/table';
import type { AuditEntryView } from '@/lib/audit/schema';
import { formatInstant } from '@/lib/format';

export function AuditTable({ entries }: { entries: AuditEntryView[] }) {
  return (
    <Table caption="The study’s trail" dense>
      <TableHead>
        <Row>
          <HeadCell num>No.</HeadCell>
          <HeadCell>When, UTC</HeadCell>
          <HeadCell>Who</HeadCell>
          <HeadCell>What</HeadCell>
          <HeadCell>From, to</HeadCell>
          <HeadCell>Why</HeadCell>
        </Row>
      </TableHead>
      <TableBody>
        {entries.map((entry) => (
          <Row key={entry.sequence}>
            <RowHead num>
              <span title={`digest ${entry.digest}`}>{entry.sequence}</span>
            </RowHead>
            <Cell className="whitespace-nowrap">{formatInstant(entry.at)}</Cell>
            <Cell>
              {entry.actorName}
              <SubLine>{entry.actorRole}</SubLine>
            </Cell>
            <Cell>
              {actionWords(entry.action)}
              <SubLine>
                {entry.recordType.replaceAll('_', ' ')}, by {entry.source}
              </SubLine>
            </Cell>
            <Cell>
              <ul>
                {entry.changes.map((change) => (
                  <li key={change.field} className="break-words">
                    {change.field}: <s className="text-ink-soft">{valueWords(change.old)}</s> {valueWords(change.new)}
                  </li>
                ))}
              </ul>
            </Cell>
            <Cell>{entry.reason}</Cell>
          </Row>
        ))}
      </TableBody>
    </Table>
  );
}
