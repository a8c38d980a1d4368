import { Link, useSearchParams } from 'react-router-dom';

interface PagerProps {
  page: number;
  pageSize: number;
  total: number;
  /** What is paged: "cases". */
  what: string;
}

/** Pages by the address (`?page=2`), so that a page can be kept and sent. Absent where everything fits on one. */
export function Pager({ page, pageSize, total, what }: PagerProps) {
  const [search] = useSearchParams();
  if (total <= pageSize) return null;
  const last = Math.ceil(total / pageSize);
  const to = (target: number) => {
    const next = new URLSearchParams(search);
    next.set('page', String(target));
    return `?${next}`;
  };
  return (
    <nav aria-label={`Pages of ${what}`} className="flex items-center gap-4 py-4">
      {page > 1 ? (
        <Link to={to(page - 1)} className="pressable-link min-h-6">
          Previous page
        </Link>
      ) : null}
      <span className="text-ink2">
        {(page - 1) * pageSize + 1} to {Math.min(page * pageSize, total)} of {total} {what}
      </span>
      {page < last ? (
        <Link to={to(page + 1)} className="pressable-link min-h-6">
          Next page
        </Link>
      ) : null}
    </nav>
  );
}
