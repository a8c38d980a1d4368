import type { ReactNode } from 'react';
import { countWord, type CaseGroup } from '#src/features/cases/case-groups.ts';

interface WorkListSentenceProps {
  /** Null while unknown. */
  counts: ReadonlyMap<CaseGroup, number> | null;
  /** Number of cases found, when something was searched for. */
  found: number | null;
  show: CaseGroup | null;
  onShow: (group: CaseGroup | null) => void;
}

const isOrAre = (n: number) => (n === 1 ? 'is' : 'are');
const ends: Record<CaseGroup, (n: number) => string> = {
  wait: (n) => (n === 1 ? 'waits for you' : 'wait for you'),
  running: (n) => `${isOrAre(n)} running`,
  'came-back': () => 'came back',
  'in-review': (n) => `${isOrAre(n)} in review`,
  others: (n) => (n === 1 ? 'waits for others' : 'wait for others'),
  closed: (n) => `${isOrAre(n)} closed`,
};

/** "Four cases wait for you, two are running, two came back": each number filters the list. */
export function WorkListSentence({ counts, found, show, onShow }: WorkListSentenceProps) {
  if (!counts) return 'Work list';
  if (found !== null)
    return (
      <>
        <b>{capital(countWord(found))}</b> {found === 1 ? 'case' : 'cases'} found
      </>
    );
  const phrase = (group: CaseGroup, words: string): ReactNode => (
    <button
      type="button"
      className="phrase"
      aria-pressed={show === group}
      onClick={() => onShow(show === group ? null : group)}
    >
      {words}
    </button>
  );
  const waiting = counts.get('wait') ?? 0;
  const rest = [...counts].filter(([group]) => group !== 'wait');
  return (
    <>
      {waiting === 0 ? (
        'No case waits for you'
      ) : (
        <>
          {phrase('wait', `${capital(countWord(waiting))} ${waiting === 1 ? 'case' : 'cases'}`)}{' '}
          {ends.wait(waiting)}
        </>
      )}
      {rest.map(([group, n]) => (
        <span key={group}>
          , {phrase(group, countWord(n))} {ends[group](n)}
        </span>
      ))}
    </>
  );
}

function capital(word: string): string {
  return word.charAt(0).toUpperCase() + word.slice(1);
}
