import type { ReactNode } from 'react';

/** Names at the left, what holds at the right, a hairline between the lines. */
export function FactList({ facts }: { facts: readonly { name: string; value: ReactNode }[] }) {
  return (
    <dl>
      {facts.map((fact) => (
        <div
          key={fact.name}
          className="flex items-baseline justify-between gap-4 border-t border-rule py-1.5"
        >
          <dt className="label text-ink2">{fact.name}</dt>
          <dd className="text-right font-[620]">{fact.value}</dd>
        </div>
      ))}
    </dl>
  );
}
