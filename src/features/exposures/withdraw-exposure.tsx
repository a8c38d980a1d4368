import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { call } from '#src/lib/call.ts';
import { useRecordForm } from '#src/lib/use-record-form.ts';
import { Button } from '#src/ui/button.tsx';
import { Dialog } from '#src/ui/dialog.tsx';
import { TextField } from '#src/ui/field.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { withdrawExposure, type Exposure } from '#shared/contracts/exposures.ts';

/** Takes an exposure out of use, with a reason; the picture and the reason stay in the record. */
export function WithdrawExposure({ exposure }: { exposure: Exposure }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <button type="button" className="pressable-link min-h-6 text-bad" onClick={() => setOpen(true)}>
        Withdraw <span className="sr-only">exposure {exposure.number}</span>
      </button>
      {open ? <Ask exposure={exposure} onClose={() => setOpen(false)} /> : null}
    </>
  );
}

function Ask({ exposure, onClose }: { exposure: Exposure; onClose: () => void }) {
  const client = useQueryClient();
  const { form, submit, busy, problem, more } = useRecordForm({
    schema: withdrawExposure.body,
    defaults: { reason: '' },
    fields: ['reason'],
    save: async (body) => {
      await call(withdrawExposure, { params: { exposureId: exposure.id }, body });
      await client.invalidateQueries({ queryKey: ['cases'] });
      void client.invalidateQueries({ queryKey: ['exposures'] });
      onClose();
    },
  });
  return (
    <Dialog title={`Withdraw exposure ${exposure.number}?`} onClose={onClose}>
      <p className="mb-3 text-ink2">
        It can’t be taken back. The picture and your reason stay in the record; a match can no longer be put
        forward from it.
      </p>
      <form noValidate onSubmit={(event) => void submit(event)} className="space-y-3">
        <TextField
          label="Reason"
          {...form.register('reason')}
          error={form.formState.errors.reason?.message}
        />
        <ProblemNotice error={problem} more={more} />
        <div className="flex gap-2">
          <Button type="submit" look="danger" busy={busy && 'Withdrawing'}>
            Withdraw
          </Button>
          <Button onClick={onClose}>Keep it</Button>
        </div>
      </form>
    </Dialog>
  );
}
