import { describe, expect, it } from 'vitest';
import { permissions, permits, roles, type Permission, type Role } from '#shared/permissions.ts';

/** The whole table, written out a second time: a change of a role's powers is a change of this test. */
const table: Record<Role, Permission[]> = {
  analyst: [
    'read-cases',
    'edit-cases',
    'read-benches',
    'edit-benches',
    'upload-exposures',
    'run-identifications',
    'submit-matches',
    'read-matches',
    'read-references',
  ],
  reviewer: ['read-cases', 'read-benches', 'read-matches', 'decide-matches', 'read-references'],
  curator: ['read-cases', 'read-benches', 'read-matches', 'read-references'],
  administrator: [
    'read-cases',
    'read-benches',
    'edit-benches',
    'read-matches',
    'read-references',
    'manage-people',
    'read-mail',
    'read-audit',
  ],
};

describe('permissions', () => {
  it.each(roles)('of the %s are these and no others', (role) => {
    const held = (Object.keys(permissions) as Permission[]).filter((p) => permits([role], p));
    expect(held.sort()).toEqual([...table[role]].sort());
  });

  it('of several roles add up, and of no role are none', () => {
    for (const permission of Object.keys(permissions) as Permission[]) {
      expect(permits([], permission)).toBe(false);
      expect(permits(['analyst', 'reviewer'], permission)).toBe(
        permits(['analyst'], permission) || permits(['reviewer'], permission),
      );
    }
  });

  it('never let one role both put a match forward and decide on it', () => {
    for (const role of roles)
      expect(permits([role], 'submit-matches') && permits([role], 'decide-matches')).toBe(false);
  });
});
