import type { Role } from '#shared/permissions.ts';

export interface DemoPerson {
  readonly id: string;
  readonly name: string;
  readonly email: string;
  readonly roles: readonly Role[];
}

/** One password for all demo accounts; they exist on loopback only. */
export const demoPassword = 'demo-laboratory-2026';

const idOf = (n: number) => `00000000-0000-4000-8000-0000000001${String(n).padStart(2, '0')}`;

/** People of an invented laboratory. */
export const demoPeople = {
  analyst: { id: idOf(1), name: 'Tamsin Orrel', email: 'tamsin.orrel@example.org', roles: ['analyst'] },
  secondAnalyst: { id: idOf(2), name: 'Joao Verrin', email: 'joao.verrin@example.org', roles: ['analyst'] },
  reviewer: { id: idOf(3), name: 'Maud Kestring', email: 'maud.kestring@example.org', roles: ['reviewer'] },
  both: {
    id: idOf(4),
    name: 'Idris Lanmoor',
    email: 'idris.lanmoor@example.org',
    roles: ['analyst', 'reviewer'],
  },
  curator: { id: idOf(5), name: 'Sela Ondrey', email: 'sela.ondrey@example.org', roles: ['curator'] },
  administrator: {
    id: idOf(6),
    name: 'Perrin Askvold',
    email: 'perrin.askvold@example.org',
    roles: ['administrator'],
  },
} as const satisfies Record<string, DemoPerson>;

/** What the sign-in page offers. */
export function demoAccounts() {
  return Object.values(demoPeople).map(({ name, email, roles }) => ({
    name,
    email,
    password: demoPassword,
    roles: [...roles] as Role[],
  }));
}
