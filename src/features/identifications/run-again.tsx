import { useMutation, useQueryClient } from '@tanstack/react-query';
import { call } from '#src/lib/call.ts';
import { startIdentification } from '#shared/contracts/identifications.ts';
import { Button } from '#src/ui/button.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';

/** Identifies the exposure anew; earlier runs stay. */
export function RunAgain({ exposureId }: { exposureId: string }) {
  const client = useQueryClient();
  const start = useMutation({
    mutationFn: () => call(startIdentification, { params: { exposureId } }),
    onSettled: () => client.invalidateQueries(),
  });
  return (
    <>
      <Button busy={start.isPending && 'Starting'} onClick={() => start.mutate()}>
        Run again
      </Button>
      <ProblemNotice error={start.error} />
    </>
  );
}
