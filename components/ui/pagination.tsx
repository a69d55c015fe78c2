import Link from 'next/link';
import { formatCount } from '@/lib/format';

interface PaginationProps {
  page: number;
  pageSize: number;
  total: number;
  hrefOf: (page: number) => string;
  /** What is counted, in the plural. */
  things: string;
}

/** `41 to 80 of 412 studies`, with the ways back and on; nothing where all fits on one page. */
export function Pagination({ page, pageSize, total, hrefOf, things }: PaginationProps) {
  const last = Math.max(1, Math.ceil(total / pageSize));
  if (last === 1) return null;
  const from = (page - 1) * pageSize + 1;
  return (
    <nav aria-label={`Pages of ${things}`} className="mt-3 flex flex-wrap items-baseline gap-5 text-13">
      <span className="text-ink-soft">
        {formatCount(from)} to {formatCount(Math.min(total, page * pageSize))} of {formatCount(total)} {things}
      </span>
      {page > 1 && (
        <Link rel="prev" href={hrefOf(page - 1)}>
          Show the {formatCount(pageSize)} before
        </Link>
      )}
      {page < last && (
        <Link rel="next" href={hrefOf(page + 1)}>
          Show the next {formatCount(Math.min(pageSize, total - page * pageSize))}
        </Link>
      )}
    </nav>
  );
}
