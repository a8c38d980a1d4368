import { useQuery } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import { useTitle } from '#src/lib/title.ts';
import { printExactTime } from '#src/lib/time.ts';
import { ButtonLink } from '#src/ui/button.tsx';
import { EmptyState } from '#src/ui/empty-state.tsx';
import { FactList } from '#src/ui/fact-list.tsx';
import { Loading } from '#src/ui/loading.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { benchesQuery } from '#src/features/benches/queries.ts';
import { drawingText } from '#src/features/cases/case-glance.tsx';
import { placeOf } from '#src/features/cases/case-ledger.tsx';
import { CaseSentence } from '#src/features/cases/case-sentence.tsx';
import { MatchHistory } from '#src/features/cases/match-history.tsx';
import { caseQuery } from '#src/features/cases/queries.ts';
import { ReopenCase } from '#src/features/cases/reopen-case.tsx';
import { ExposureRow } from '#src/features/exposures/exposure-row.tsx';
import { UploadPanel } from '#src/features/exposures/upload-panel.tsx';
import type { Case } from '#shared/contracts/cases.ts';

export function Component() {
  const { caseId = '' } = useParams();
  const stored = useQuery(caseQuery(caseId));
  useTitle(stored.data ? `${stored.data.number} ${stored.data.title}` : 'Case');
  if (stored.data)
    return <CasePage stored={stored.data} lost={stored.error} onRetry={() => void stored.refetch()} />;
  return (
    <>
      <Sentence>Case</Sentence>
      <ProblemNotice error={stored.error} onRetry={() => void stored.refetch()} />
      {stored.isPending ? <Loading what="the case" /> : null}
    </>
  );
}

/** A title may be a question. */
const sentenceOf = (title: string) => (/[.?!]$/.test(title) ? title : `${title}.`);

function CasePage({ stored, lost, onRetry }: { stored: Case; lost: unknown; onRetry: () => void }) {
  const benches = useQuery({ ...benchesQuery, enabled: stored.can.upload });
  const exposures = [...stored.exposures].sort((a, b) => b.number - a.number);
  return (
    <>
      <Sentence
        below={`${sentenceOf(stored.title)} ${placeOf(stored)}.`}
        deeds={
          <>
            {stored.can.edit ? <ButtonLink to={`/cases/${stored.id}/edit`}>Edit the case</ButtonLink> : null}
            {stored.can.reopen ? <ReopenCase caseId={stored.id} /> : null}
          </>
        }
      >
        <CaseSentence stored={stored} />
      </Sentence>
      <ProblemNotice error={lost} onRetry={onRetry} className="mb-4" />
      <div className="grid gap-x-11 gap-y-8 lg:grid-cols-[minmax(0,1fr)_400px]">
        <section aria-labelledby="exposures" className="min-w-0">
          <h2 id="exposures" className="border-b border-rule pb-1.5">
            Exposures <span className="label ml-1.5 text-ink3">{exposures.length || ''}</span>
          </h2>
          {exposures.length === 0 ? (
            <EmptyState
              fact="No exposure yet."
              next={
                stored.can.upload
                  ? 'Choose the bench, then drop the pictures: each is identified as soon as it has arrived.'
                  : 'An analyst adds the pictures.'
              }
            />
          ) : (
            <ul>
              {exposures.map((exposure) => (
                <ExposureRow key={exposure.id} exposure={exposure} />
              ))}
            </ul>
          )}
        </section>
        <div className="min-w-0 space-y-7">
          {stored.can.upload ? (
            <section aria-labelledby="add-exposures">
              <h2 id="add-exposures" className="mb-3 border-b border-rule pb-1.5">
                Add exposures
              </h2>
              <ProblemNotice error={benches.error} onRetry={() => void benches.refetch()} />
              {benches.isPending ? <Loading what="the benches" /> : null}
              {benches.data ? <UploadPanel caseId={stored.id} benches={benches.data.benches} /> : null}
            </section>
          ) : null}
          <section aria-labelledby="about">
            <h2 id="about" className="pb-1.5">
              Question and drawing
            </h2>
            {stored.question ? <p className="pb-2 whitespace-pre-line">{stored.question}</p> : null}
            <FactList
              facts={[
                { name: 'Part', value: stored.part },
                { name: 'Lot', value: stored.lot || 'not given' },
                { name: 'Specimen', value: stored.specimen || 'not given' },
                { name: 'Drawing', value: stored.drawing ? drawingText(stored.drawing) : 'not given' },
                { name: 'Opened', value: `${stored.createdBy.name}, ${printExactTime(stored.createdAt)}` },
              ]}
            />
          </section>
          <section aria-labelledby="matches">
            <h2 id="matches" className="pb-1.5">
              Matches <span className="label ml-1.5 text-ink3">U with k = 2</span>
            </h2>
            <MatchHistory matches={stored.matches} />
          </section>
        </div>
      </div>
    </>
  );
}
