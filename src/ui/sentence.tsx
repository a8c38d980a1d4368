import type { ReactNode } from 'react';

interface SentenceProps {
  /** The state of the work in plain words, numbers in <b>. */
  children: ReactNode;
  below?: ReactNode;
  deeds?: ReactNode;
}

/** The opening of every screen: its headline sentence, one line below it, the deeds at the right. */
export function Sentence({ children, below, deeds }: SentenceProps) {
  return (
    <header className="flex items-start justify-between gap-x-8 gap-y-3 pt-6 pb-4 max-sm:flex-col">
      <div className="min-w-0">
        <h1 tabIndex={-1} className="sentence">
          {children}
        </h1>
        {below ? <p className="mt-1 text-ink2">{below}</p> : null}
      </div>
      {deeds ? <div className="flex flex-wrap items-center gap-2 pt-0.5 sm:shrink-0">{deeds}</div> : null}
    </header>
  );
}
