import { useQueryClient } from '@tanstack/react-query';
import { call } from '#src/lib/call.ts';
import { sessionQuery } from '#src/lib/session.ts';
import { useRecordForm } from '#src/lib/use-record-form.ts';
import { Button } from '#src/ui/button.tsx';
import { TextField } from '#src/ui/field.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { createFirstAdministrator, firstAdministratorSchema } from '#shared/contracts/session.ts';

/** An empty laboratory: the one-time code of the console makes the first administrator. */
export function FirstAdministratorForm() {
  const client = useQueryClient();
  const { form, submit, busy, problem, more } = useRecordForm({
    schema: firstAdministratorSchema,
    defaults: { code: '', name: '', email: '', password: '' },
    fields: ['code', 'name', 'email', 'password'],
    save: async (body) => {
      client.setQueryData(sessionQuery.queryKey, await call(createFirstAdministrator, { body }));
    },
  });
  const errors = form.formState.errors;
  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="space-y-4">
      <p className="text-ink2">
        This laboratory has no account yet. The console of the server prints a one-time code at its start.
      </p>
      <TextField
        label="One-time code"
        autoComplete="one-time-code"
        {...form.register('code')}
        error={errors.code?.message}
      />
      <TextField
        label="Your name"
        autoComplete="name"
        {...form.register('name')}
        error={errors.name?.message}
      />
      <TextField
        label="E-mail"
        type="email"
        autoComplete="username"
        {...form.register('email')}
        error={errors.email?.message}
      />
      <TextField
        label="Password"
        type="password"
        autoComplete="new-password"
        hint="At least 12 characters; a few unrelated words are good."
        {...form.register('password')}
        error={errors.password?.message}
      />
      <ProblemNotice error={problem} more={more} />
      <Button type="submit" look="go" busy={busy && 'Creating the account'}>
        Create the administrator
      </Button>
    </form>
  );
}
