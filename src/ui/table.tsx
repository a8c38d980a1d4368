import type { ReactNode } from 'react';
import { classNames } from '#src/ui/class-names.ts';

export interface Column<T> {
  key: string;
  head: string;
  cell: (row: T) => ReactNode;
  /** Numbers stand right. */
  right?: boolean;
  /** Folded away under 1100 px. */
  wideOnly?: boolean;
}

interface TableProps<T> {
  caption: string;
  columns: readonly Column<T>[];
  rows: readonly T[];
  rowKey: (row: T) => string;
}

/** A ruled table; the first column names the row. Scrolls inside its own frame where the window is narrow. */
export function Table<T>({ caption, columns, rows, rowKey }: TableProps<T>) {
  return (
    <div tabIndex={0} role="region" aria-label={caption} className="overflow-x-auto">
      <table className="w-full border-collapse text-left">
        <caption className="sr-only">{caption}</caption>
        <thead>
          <tr className="border-b border-edge">
            {columns.map((c) => (
              <th key={c.key} scope="col" className={cellClass(c, 'label pb-1.5 align-bottom text-ink3')}>
                {c.head}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr key={rowKey(row)} className="border-b border-rule">
              {columns.map((c, i) =>
                i === 0 ? (
                  <th key={c.key} scope="row" className={cellClass(c, 'name py-2 align-top')}>
                    {c.cell(row)}
                  </th>
                ) : (
                  <td key={c.key} className={cellClass(c, 'py-2 align-top')}>
                    {c.cell(row)}
                  </td>
                ),
              )}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

function cellClass(column: { right?: boolean; wideOnly?: boolean }, rest: string): string {
  return classNames(rest, 'pr-6 last:pr-0', column.right && 'text-right', column.wideOnly && 'max-lg:hidden');
}
