import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { call } from '#src/lib/call.ts';
import { useRecordForm } from '#src/lib/use-record-form.ts';
import { Button } from '#src/ui/button.tsx';
import { TextField } from '#src/ui/field.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { reopenCase } from '#shared/contracts/cases.ts';

/** Opens a closed case again; the reason goes into the record. */
export function ReopenCase({ caseId }: { caseId: string }) {
  const client = useQueryClient();
  const [asking, setAsking] = useState(false);
  const { form, submit, busy, problem, more } = useRecordForm({
    schema: reopenCase.body,
    defaults: { reason: '' },
    fields: ['reason'],
    save: async (body) => {
      client.setQueryData(['cases', caseId], await call(reopenCase, { params: { caseId }, body }));
      void client.invalidateQueries({ queryKey: ['cases'] });
      setAsking(false);
    },
  });
  if (!asking) return <Button onClick={() => setAsking(true)}>Reopen the case</Button>;
  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="flex flex-wrap items-end gap-2">
      <TextField
        label="Reason to reopen"
        className="w-72"
        autoFocus
        {...form.register('reason')}
        error={form.formState.errors.reason?.message}
      />
      <Button type="submit" look="ink" busy={busy && 'Reopening'}>
        Reopen
      </Button>
      <Button look="bare" onClick={() => setAsking(false)}>
        Leave it closed
      </Button>
      <ProblemNotice error={problem} more={more} className="w-full" />
    </form>
  );
}
