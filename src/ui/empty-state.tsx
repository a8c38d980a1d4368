import type { ReactNode } from 'react';

interface EmptyStateProps {
  /** One line of fact. */
  fact: string;
  /** One line of what comes next. */
  next?: ReactNode;
  /** One small button. */
  children?: ReactNode;
}

export function EmptyState({ fact, next, children }: EmptyStateProps) {
  return (
    <div className="flex items-center gap-5 py-6">
      <svg viewBox="0 0 84 84" width="84" height="84" aria-hidden="true" className="shrink-0">
        <circle cx="42" cy="42" r="40" fill="none" stroke="var(--edge)" strokeDasharray="3 4" />
        <path
          d="M14 70 70 14"
          stroke="var(--edge)"
          strokeWidth="1.4"
          strokeDasharray="1 5"
          strokeLinecap="round"
        />
      </svg>
      <div>
        <p className="reading">{fact}</p>
        {next ? <p className="text-ink2">{next}</p> : null}
        {children ? <div className="mt-2">{children}</div> : null}
      </div>
    </div>
  );
}
