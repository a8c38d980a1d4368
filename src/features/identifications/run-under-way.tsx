import { useMutation, useQueryClient } from '@tanstack/react-query';
import { call } from '#src/lib/call.ts';
import { useKeys } from '#src/lib/keys.ts';
import { cancelIdentification, type Identification } from '#shared/contracts/identifications.ts';
import { Button } from '#src/ui/button.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { ProgressBar } from '#src/ui/progress-bar.tsx';

/** What the engine is doing, how far it is, and the way to stop it. */
export function RunUnderWay({ run }: { run: Identification }) {
  const client = useQueryClient();
  const cancel = useMutation({
    mutationFn: () => call(cancelIdentification, { params: { identificationId: run.id } }),
    onSettled: () => client.invalidateQueries(),
  });
  useKeys(run.can.cancel ? [{ keys: 'Escape', label: 'stop', run: () => cancel.mutate() }] : []);
  return (
    <section aria-label="Identification under way" className="border-t border-rule py-4">
      <div className="flex flex-wrap items-center gap-6">
        <ProgressBar share={run.progress.share} step={run.state === 'queued' ? '' : run.progress.step} />
        {run.can.cancel ? (
          <Button
            small
            busy={cancel.isPending && 'Stopping'}
            onClick={() => cancel.mutate()}
            keyHint="Escape"
          >
            Stop
          </Button>
        ) : null}
      </div>
      <p className="label mt-2 text-ink3">It goes on when this page is closed.</p>
      <ProblemNotice error={cancel.error} className="mt-3" />
    </section>
  );
}
