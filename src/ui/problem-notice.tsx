import { asProblem } from '#src/lib/problem.ts';
import { Notice } from '#src/ui/notice.tsx';

interface ProblemNoticeProps {
  error: unknown;
  /** Sentences of fields that the form does not show. */
  more?: readonly string[];
  onRetry?: (() => void) | undefined;
  className?: string;
}

/** What went wrong, what it does and what to do, where it happened. */
export function ProblemNotice({ error, more = [], onRetry, className }: ProblemNoticeProps) {
  if (!error) return null;
  const problem = asProblem(error);
  return (
    <Notice tone="bad" lead={`${problem.title}.`} role="alert" className={className ?? ''}>
      {problem.message}
      {more.map((sentence) => (
        <span key={sentence}> {sentence}</span>
      ))}
      {onRetry ? (
        <>
          {' '}
          <button type="button" className="pressable-link min-h-6" onClick={onRetry}>
            Try now
          </button>
        </>
      ) : null}
    </Notice>
  );
}
