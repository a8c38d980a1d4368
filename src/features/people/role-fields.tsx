import type { UseFormRegisterReturn } from 'react-hook-form';
import { CheckBox } from '#src/ui/check-box.tsx';
import { roles, type Role } from '#shared/permissions.ts';

const does: Record<Role, string> = {
  analyst: 'Opens cases, uploads exposures, puts matches forward.',
  reviewer: 'Confirms, sends back or rejects matches of others, with a signature.',
  curator: 'Keeps the library of references.',
  administrator: 'People, benches, mail, audit trail.',
};

/** The roles of a person, with what each does. */
export function RoleFields({ field, error }: { field: UseFormRegisterReturn; error: string | undefined }) {
  return (
    <fieldset className="space-y-1.5" aria-describedby={error ? 'roles-error' : undefined}>
      <legend className="label mb-1 text-ink2">Roles</legend>
      {roles.map((role) => (
        <CheckBox
          key={role}
          {...field}
          value={role}
          label={
            <span>
              {role[0].toUpperCase() + role.slice(1)}{' '}
              <span className="font-[500] text-ink3">{does[role]}</span>
            </span>
          }
        />
      ))}
      {error ? (
        <p id="roles-error" className="label text-bad" role="alert">
          {error}
        </p>
      ) : null}
    </fieldset>
  );
}
