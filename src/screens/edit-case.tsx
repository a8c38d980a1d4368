import { useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate, useParams } from 'react-router-dom';
import { call } from '#src/lib/call.ts';
import { useTitle } from '#src/lib/title.ts';
import { Loading } from '#src/ui/loading.tsx';
import { Notice } from '#src/ui/notice.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { CaseForm } from '#src/features/cases/case-form.tsx';
import { caseQuery } from '#src/features/cases/queries.ts';
import { editCase, type Case } from '#shared/contracts/cases.ts';

export function Component() {
  const { caseId = '' } = useParams();
  const stored = useQuery(caseQuery(caseId));
  useTitle(stored.data ? `Edit ${stored.data.number}` : 'Edit case');
  if (stored.data) return <Edit key={stored.data.id} stored={stored.data} />;
  return (
    <>
      <Sentence>Edit case</Sentence>
      <ProblemNotice error={stored.error} onRetry={() => void stored.refetch()} />
      {stored.isPending ? <Loading what="the case" /> : null}
    </>
  );
}

/** Edits the case as it was when the form was opened; a newer version of somebody else is noticed on saving. */
function Edit({ stored }: { stored: Case }) {
  const client = useQueryClient();
  const navigate = useNavigate();
  const [opened, setOpened] = useState(stored);
  return (
    <>
      <Sentence>
        Edit <b>{opened.number}</b>
      </Sentence>
      {stored.can.edit ? null : (
        <Notice tone="warn" lead="This case can’t be edited now." className="mb-4">
          It is in review, closed, or your role does not include it. Reopen it first, with a reason.
        </Notice>
      )}
      <CaseForm
        key={opened.version}
        stored={opened}
        leaveTo={`/cases/${opened.id}`}
        save={async (draft) => {
          const saved = await call(editCase, {
            params: { caseId: opened.id },
            body: { ...draft, version: opened.version },
          });
          client.setQueryData(['cases', saved.id], saved);
          void client.invalidateQueries({ queryKey: ['cases', 'list'] });
          await navigate(`/cases/${saved.id}`);
        }}
        onTakeTheirs={() =>
          void client
            .fetchQuery({ ...caseQuery(opened.id), staleTime: 0 })
            .then((theirs) => setOpened(theirs))
        }
      />
    </>
  );
}
