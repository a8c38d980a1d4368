import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { useSearchParams } from 'react-router-dom';
import { call } from '#src/lib/call.ts';
import { useTitle } from '#src/lib/title.ts';
import { printExactTime } from '#src/lib/time.ts';
import { EmptyState } from '#src/ui/empty-state.tsx';
import { Loading } from '#src/ui/loading.tsx';
import { Pager } from '#src/ui/pager.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { listMail, type Mail } from '#shared/contracts/mail.ts';

const stateWords: Record<Mail['state'], string> = {
  held: 'held here: no mail server is set',
  queued: 'on its way',
  sent: 'sent',
  failed: 'not sent',
};

export function Component() {
  useTitle('Mail outbox');
  const [search] = useSearchParams();
  const page = Math.max(1, Number(search.get('page')) || 1);
  const mail = useQuery({
    queryKey: ['mail', page],
    queryFn: ({ signal }) => call(listMail, { query: { page }, signal }),
    placeholderData: keepPreviousData,
    refetchInterval: 15_000,
  });
  const rows = mail.data?.rows ?? [];
  return (
    <>
      <Sentence below="What the laboratory wrote to its people. Without a mail server the messages wait here to be read.">
        {mail.data ? (
          <>
            <b>{mail.data.total === 0 ? 'No' : mail.data.total}</b>{' '}
            {mail.data.total === 1 ? 'message' : 'messages'}
          </>
        ) : (
          'Mail outbox'
        )}
      </Sentence>
      <ProblemNotice error={mail.error} onRetry={() => void mail.refetch()} />
      {mail.isPending ? <Loading what="the mail" /> : null}
      {mail.data && rows.length === 0 ? (
        <EmptyState
          fact="Nothing was written yet."
          next="A match that comes back from review writes to its analyst."
        />
      ) : null}
      <ul>
        {rows.map((message) => (
          <li key={message.id} className="border-t border-rule">
            <details>
              <summary className="grid min-h-11 grid-cols-1 items-center gap-x-6 py-2 sm:grid-cols-[minmax(0,1.2fr)_minmax(0,2fr)_170px]">
                <span className="name break-all">{message.to}</span>
                <span>{message.subject}</span>
                <span className="label text-ink3 sm:text-right">
                  {printExactTime(message.createdAt)}, {stateWords[message.state]}
                </span>
              </summary>
              <div className="max-w-3xl pb-4">
                {message.lastError ? <p className="mb-2 text-bad">{message.lastError}</p> : null}
                <p className="border-l-[3px] border-edge bg-sheet px-4 py-3 break-words whitespace-pre-line">
                  {message.text}
                </p>
              </div>
            </details>
          </li>
        ))}
      </ul>
      {mail.data ? <Pager {...mail.data} what="messages" /> : null}
    </>
  );
}
