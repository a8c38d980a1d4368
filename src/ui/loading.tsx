import { useEffect, useState } from 'react';

/** Says what is being fetched, once it takes longer than an eye-blink. */
export function Loading({ what }: { what: string }) {
  const [late, setLate] = useState(false);
  useEffect(() => {
    const timer = setTimeout(() => setLate(true), 250);
    return () => clearTimeout(timer);
  }, []);
  return (
    <div role="status" className="flex min-h-40 items-center gap-5 py-6">
      {late ? (
        <>
          <svg viewBox="0 0 44 44" width="44" height="44" aria-hidden="true">
            <circle cx="22" cy="22" r="20" fill="none" stroke="var(--edge)" />
            <path d="M22 2a20 20 0 0 0 0 40z" fill="var(--ink)" />
            <path
              d="M22 2a20 20 0 0 1 0 40"
              fill="none"
              stroke="var(--model)"
              strokeWidth="3"
              pathLength="100"
              strokeDasharray="100"
              className="animate-[grow-arc_1.4s_ease-out_infinite]"
            />
          </svg>
          <p className="reading">Fetching {what}</p>
        </>
      ) : (
        <span className="sr-only">Fetching {what}</span>
      )}
    </div>
  );
}
