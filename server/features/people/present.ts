import type { PersonRow } from '#server/features/people/store.ts';
import type { Person } from '#shared/contracts/people.ts';

export function presentPerson(row: PersonRow): Person {
  const { id, name, email, roles, active, version } = row;
  return { id, name, email, roles, active, version, createdAt: row.createdAt.toISOString() };
}
