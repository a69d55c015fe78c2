import { mailWords } from '@/components/alerts/alert-words';
import { Pagination } from '@/components/ui/pagination';
import { Section } from '@/components/ui/section';
import { Cell, HeadCell, Row, RowHead, Table, TableBody, TableHead } from '@/components/ui/table';
import type { SentAlert } from '@/lib/alerts/schema';
import { formatInstant } from '@/lib/format';

interface Props {
  items: SentAlert[];
  page: number;
  size: number;
  total: number;
}

const NAMED = 20;

/** What was said to whom, and what became of each message. */
export function SentAlerts({ items, page, size, total }: Props) {
  return (
    <Section id="sent" title="What was sent" aside="Newest first">
      {total === 0 ? (
        <p className="text-ink-soft">No rule has spoken yet.</p>
      ) : (
        <Table caption="Alerts that were sent">
          <TableHead>
            <Row>
              <HeadCell>When, UTC</HeadCell>
              <HeadCell>News</HeadCell>
              <HeadCell>To</HeadCell>
            </Row>
          </TableHead>
          <TableBody>
            {items.map((alert) => (
              <Row key={alert.id}>
                <RowHead className="whitespace-nowrap">{formatInstant(alert.raisedAt)}</RowHead>
                <Cell>{alert.headline}</Cell>
                <Cell className="text-13">
                  {alert.mails.length === 0 && <span className="text-caution">nobody: no reader matched the rule</span>}
                  <ul>
                    {alert.mails.slice(0, NAMED).map((mail, place) => (
                      <li key={place}>
                        {mail.name}:{' '}
                        <span
                          className={
                            mail.state === 'bounced' || mail.state === 'failed' ? 'text-stop' : 'text-ink-soft'
                          }
                        >
                          {mailWords(mail)}
                        </span>
                      </li>
                    ))}
                    {alert.mails.length > NAMED && <li>and {alert.mails.length - NAMED} more</li>}
                  </ul>
                </Cell>
              </Row>
            ))}
          </TableBody>
        </Table>
      )}
      <Pagination page={page} pageSize={size} total={total} things="alerts" hrefOf={(to) => `?page=${to}#sent`} />
    </Section>
  );
}
