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
  const waiting = counts.get('wait') ?? 0;
  return (
    <>
      {waiting === 0 ? (
        'No case waits for you'
      ) : (
        <>
          <Phrase group="wait" show={show} onShow={onShow}>
            {capital(countWord(waiting))} {waiting === 1 ? 'case' : 'cases'}
          </Phrase>{' '}
          {ends.wait(waiting)}
        </>
      )}
      {(['running', 'came-back', 'in-review'] as const).map((group) => {
        const n = counts.get(group);
        return n ? (
          <span key={group}>
            ,{' '}
            <Phrase group={group} show={show} onShow={onShow}>
              {countWord(n)}
            </Phrase>{' '}
            {ends[group](n)}
          </span>
        ) : null;
      })}
    </>
  );
}

/** The groups that nobody here has to act on, in the smaller line below. */
export function WorkListRest({ counts, show, onShow }: Omit<WorkListSentenceProps, 'found'>) {
  return (['others', 'closed'] as const).map((group) => {
    const n = counts?.get(group);
    return n ? (
      <span key={group}>
        {' '}
        <Phrase group={group} show={show} onShow={onShow}>
          {capital(countWord(n))}
        </Phrase>{' '}
        {ends[group](n)}.
      </span>
    ) : null;
  });
}

interface PhraseProps extends Pick<WorkListSentenceProps, 'show' | 'onShow'> {
  group: CaseGroup;
  children: ReactNode;
}

function Phrase({ group, show, onShow, children }: PhraseProps) {
  const pressed = show === group;
  return (
    <button
      type="button"
      className="phrase min-h-6"
      aria-pressed={pressed}
      onClick={() => onShow(pressed ? null : group)}
    >
      {children}
    </button>
  );
}

function capital(word: string): string {
  return word.charAt(0).toUpperCase() + word.slice(1);
}
