import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { call } from '#src/lib/call.ts';
import type { Candidate, Identification } from '#shared/contracts/identifications.ts';
import { submitMatch } from '#shared/contracts/matches.ts';
import { Button } from '#src/ui/button.tsx';
import { Dialog } from '#src/ui/dialog.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { TextArea } from '#src/ui/text-area.tsx';
import { CandidateSentence } from '#src/features/identifications/headline.tsx';

interface PutForwardProps {
  caseId: string;
  run: Identification;
  candidate: Candidate;
  candidateIndex: number;
  ambiguous: boolean;
  onClose: () => void;
}

/** Puts the chosen candidate forward as a match, with a comment for the second person. */
export function PutForward({ caseId, run, candidate, candidateIndex, ambiguous, onClose }: PutForwardProps) {
  const [comment, setComment] = useState('');
  const client = useQueryClient();
  const navigate = useNavigate();
  const submit = useMutation({
    mutationFn: () =>
      call(submitMatch, {
        params: { caseId },
        body: { identificationId: run.id, candidateIndex, comment },
      }),
    onSuccess: async () => {
      await client.invalidateQueries();
      await navigate(`/cases/${caseId}`);
    },
  });
  return (
    <Dialog title="Put this match forward?" onClose={onClose}>
      <form
        onSubmit={(event) => {
          event.preventDefault();
          submit.mutate();
        }}
      >
        <p className="glance-title my-2">
          <CandidateSentence candidate={candidate} />
        </p>
        <p className="mb-3 text-ink2">
          U is expanded, k = 2. A second person compares it with the picture and confirms, returns or rejects
          it; until then the case stays as it is.
          {ambiguous ? ' The verdict is ambiguous: the match says so.' : ''}
        </p>
        <TextArea
          label="Comment for the reviewer"
          hint="What speaks for this candidate, and what you could not tell. May stay empty."
          value={comment}
          maxLength={2000}
          onChange={(event) => setComment(event.target.value)}
        />
        <ProblemNotice error={submit.error} className="mt-3" />
        <div className="mt-4 flex gap-3">
          <Button type="submit" look="go" busy={submit.isPending && 'Sending'}>
            Put forward
          </Button>
          <Button onClick={onClose}>Not yet</Button>
        </div>
      </form>
    </Dialog>
  );
}
