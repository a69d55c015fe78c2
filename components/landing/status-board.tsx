'use client';

import { useEffect, useState } from 'react';
import { Cell, HeadCell, Row, RowHead, Table, TableBody, TableHead } from '@/components/ui/table';
import { formatInstant } from '@/lib/format';

const PARTS = [
  { path: '/api/health', name: 'The application', fine: 'answers', wrong: 'does not answer' },
  { path: '/api/ready', name: 'Database and queue of forecasts', fine: 'ready', wrong: 'not ready' },
] as const;

interface Answer {
  fine: boolean;
  at: string;
}

async function ask(path: string): Promise<boolean> {
  try {
    return (await fetch(path, { cache: 'no-store' })).ok;
  } catch {
    return false;
  }
}

/** Asks each part how it is, now and every half minute. */
export function StatusBoard() {
  const [answers, setAnswers] = useState<Partial<Record<string, Answer>>>({});
  useEffect(() => {
    let left = false;
    const askAll = async (): Promise<void> => {
      const found = await Promise.all(
        PARTS.map(async ({ path }) => [path, { fine: await ask(path), at: new Date().toISOString() }] as const),
      );
      if (!left) setAnswers(Object.fromEntries(found));
    };
    void askAll();
    const timer = setInterval(() => void askAll(), 30_000);
    return () => {
      left = true;
      clearInterval(timer);
    };
  }, []);
  return (
    <Table caption="Parts of this installation">
      <TableHead>
        <Row>
          <HeadCell>Part</HeadCell>
          <HeadCell>State</HeadCell>
          <HeadCell>Asked, UTC</HeadCell>
        </Row>
      </TableHead>
      <TableBody>
        {PARTS.map((part) => {
          const answer = answers[part.path];
          return (
            <Row key={part.path}>
              <RowHead>{part.name}</RowHead>
              <Cell className={answer && !answer.fine ? 'font-600 text-stop' : undefined}>
                {answer ? (answer.fine ? part.fine : part.wrong) : 'being asked'}
              </Cell>
              <Cell className="text-ink-soft">{answer ? formatInstant(answer.at) : ''}</Cell>
            </Row>
          );
        })}
      </TableBody>
    </Table>
  );
}
