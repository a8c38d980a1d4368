import { useState } from 'react';
import { call } from '#src/lib/call.ts';
import { useRecordForm } from '#src/lib/use-record-form.ts';
import { Button } from '#src/ui/button.tsx';
import { TextField } from '#src/ui/field.tsx';
import { Notice } from '#src/ui/notice.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { changePassword, changePasswordSchema } from '#shared/contracts/session.ts';

export function ChangePasswordForm({ email }: { email: string }) {
  const [done, setDone] = useState(false);
  const { form, submit, busy, problem, more } = useRecordForm({
    schema: changePasswordSchema,
    defaults: { currentPassword: '', newPassword: '' },
    fields: ['currentPassword', 'newPassword'],
    save: async (body) => {
      setDone(false);
      await call(changePassword, { body });
      form.reset();
      setDone(true);
    },
  });
  const errors = form.formState.errors;
  const wrong = problem?.code === 'wrong-password' ? problem.message : undefined;
  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="max-w-[360px] space-y-4">
      {/* Lets a password manager know whose password this is. */}
      <input type="hidden" name="username" autoComplete="username" value={email} readOnly />
      <TextField
        label="Present password"
        type="password"
        autoComplete="current-password"
        {...form.register('currentPassword')}
        error={errors.currentPassword?.message ?? wrong}
      />
      <TextField
        label="New password"
        type="password"
        autoComplete="new-password"
        hint="At least 12 characters; a few unrelated words are good."
        {...form.register('newPassword')}
        error={errors.newPassword?.message}
      />
      {wrong ? null : <ProblemNotice error={problem} more={more} />}
      {done ? (
        <Notice tone="ok" lead="Changed." role="status">
          The new password holds from now on, for signing too.
        </Notice>
      ) : null}
      <Button type="submit" look="go" busy={busy && 'Changing'}>
        Change password
      </Button>
    </form>
  );
}
