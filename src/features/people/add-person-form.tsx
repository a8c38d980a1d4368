import type { z } from 'zod';
import { useRecordForm } from '#src/lib/use-record-form.ts';
import { Button, ButtonLink } from '#src/ui/button.tsx';
import { TextField } from '#src/ui/field.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { RoleFields } from '#src/features/people/role-fields.tsx';
import { addPersonSchema } from '#shared/contracts/people.ts';

interface AddPersonFormProps {
  save: (person: z.output<typeof addPersonSchema>) => Promise<void>;
}

export function AddPersonForm({ save }: AddPersonFormProps) {
  const { form, submit, busy, problem, more } = useRecordForm({
    schema: addPersonSchema,
    defaults: { name: '', email: '', roles: ['analyst'], password: '' },
    fields: ['name', 'email', 'roles', 'password'],
    save,
  });
  const errors = form.formState.errors;
  const taken = problem?.code === 'email-taken' ? problem.message : undefined;
  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="max-w-[560px] space-y-4">
      <TextField label="Name" autoComplete="off" {...form.register('name')} error={errors.name?.message} />
      <TextField
        label="E-mail"
        type="email"
        autoComplete="off"
        {...form.register('email')}
        error={errors.email?.message ?? taken}
      />
      <TextField
        label="First password"
        autoComplete="off"
        {...form.register('password')}
        error={errors.password?.message}
        hint="At least 12 characters. Hand it over in person; they change it under their name."
      />
      <RoleFields field={form.register('roles')} error={errors.roles?.message} />
      {taken ? null : <ProblemNotice error={problem} more={more} />}
      <div className="flex gap-3">
        <Button type="submit" look="go" busy={busy && 'Adding'}>
          Add the person
        </Button>
        <ButtonLink to="/people">Leave it</ButtonLink>
      </div>
    </form>
  );
}
