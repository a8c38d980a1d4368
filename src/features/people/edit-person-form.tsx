import type { z } from 'zod';
import { useRecordForm } from '#src/lib/use-record-form.ts';
import { Button, ButtonLink } from '#src/ui/button.tsx';
import { CheckBox } from '#src/ui/check-box.tsx';
import { TextField } from '#src/ui/field.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { RoleFields } from '#src/features/people/role-fields.tsx';
import { editPersonSchema, type Person } from '#shared/contracts/people.ts';

interface EditPersonFormProps {
  person: Person;
  save: (person: z.output<typeof editPersonSchema>) => Promise<void>;
  onTakeTheirs: () => void;
}

export function EditPersonForm({ person, save, onTakeTheirs }: EditPersonFormProps) {
  const { form, submit, busy, problem, more } = useRecordForm({
    schema: editPersonSchema,
    defaults: person,
    fields: ['name', 'roles', 'active'],
    save,
  });
  const errors = form.formState.errors;
  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="max-w-[560px] space-y-4">
      <TextField label="Name" autoComplete="off" {...form.register('name')} error={errors.name?.message} />
      <RoleFields field={form.register('roles')} error={errors.roles?.message} />
      <CheckBox
        label="May sign in"
        hint="Off: the account is closed, its open sessions end, and its records stay."
        {...form.register('active')}
        error={errors.active?.message}
      />
      <ProblemNotice error={problem} more={more} />
      {problem?.code === 'stale-edit' ? (
        <Button small onClick={onTakeTheirs}>
          Drop mine and fetch theirs
        </Button>
      ) : null}
      <div className="flex gap-3">
        <Button type="submit" look="go" busy={busy && 'Saving'}>
          Save
        </Button>
        <ButtonLink to="/people">Leave it</ButtonLink>
      </div>
    </form>
  );
}
