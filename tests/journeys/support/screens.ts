import type { Page } from 'playwright-core';

export interface ScreenUnderTest {
  readonly name: string;
  /** Who looks at it; null for nobody signed in. */
  readonly person: string | null;
  readonly path: (page: Page) => Promise<string>;
  /** Text that stands there once everything has arrived. */
  readonly shows: string | RegExp;
}

const at = (path: string) => () => Promise.resolve(path);

/** The address of the newest exposure of a demo case, or of its match. */
async function ofCase(
  page: Page,
  number: string,
  of: 'case' | 'exposure' | 'match' | 'edit',
): Promise<string> {
  const row = await page.evaluate(async (wanted) => {
    const list = (await (await fetch('/api/cases?pageSize=200')).json()) as {
      rows: { id: string; number: string; exposureId: string; matchId: string }[];
    };
    return list.rows.find((r) => r.number === wanted)!;
  }, number);
  switch (of) {
    case 'case':
      return `/cases/${row.id}`;
    case 'edit':
      return `/cases/${row.id}/edit`;
    case 'exposure':
      return `/exposures/${row.exposureId}`;
    case 'match':
      return `/reviews/${row.matchId}`;
  }
}

async function first(page: Page, list: string, key: string): Promise<string> {
  return page.evaluate(
    async ([address, field]) =>
      ((await (await fetch(address)).json()) as Record<string, { id: string }[]>)[field][0].id,
    [list, key],
  );
}

/** Every screen of the product: for its picture and for its checks. */
export const screens: readonly ScreenUnderTest[] = [
  { name: 'sign-in', person: null, path: at('/sign-in'), shows: 'Demo laboratory' },
  { name: 'work-list', person: 'Tamsin Orrel', path: at('/'), shows: 'FW-0001' },
  { name: 'new-case', person: 'Tamsin Orrel', path: at('/cases/new'), shows: 'Open the case' },
  {
    name: 'case',
    person: 'Tamsin Orrel',
    path: (p) => ofCase(p, 'FW-0001', 'case'),
    shows: 'Drop exposures here',
  },
  {
    name: 'edit-case',
    person: 'Tamsin Orrel',
    path: (p) => ofCase(p, 'FW-0001', 'edit'),
    shows: 'Save the case',
  },
  {
    name: 'exposure',
    person: 'Tamsin Orrel',
    path: (p) => ofCase(p, 'FW-0001', 'exposure'),
    shows: 'Profile across the axis',
  },
  {
    name: 'exposure-ambiguous',
    person: 'Tamsin Orrel',
    path: (p) => ofCase(p, 'FW-0007', 'exposure'),
    shows: 'Ambiguous',
  },
  {
    name: 'exposure-unidentified',
    person: 'Tamsin Orrel',
    path: (p) => ofCase(p, 'FW-0008', 'exposure'),
    shows: 'Unidentified',
  },
  { name: 'review-table', person: 'Maud Kestring', path: at('/reviews'), shows: 'FW-0002, match 1' },
  {
    name: 'review',
    person: 'Maud Kestring',
    path: (p) => ofCase(p, 'FW-0002', 'match'),
    shows: 'Profile across the axis',
  },
  { name: 'library', person: 'Sela Ondrey', path: at('/library'), shows: 'PH-001' },
  { name: 'benches', person: 'Tamsin Orrel', path: at('/benches'), shows: 'Bench 2, 100 mm lens' },
  { name: 'new-bench', person: 'Tamsin Orrel', path: at('/benches/new'), shows: 'Pixel pitch' },
  {
    name: 'edit-bench',
    person: 'Tamsin Orrel',
    path: async (p) => `/benches/${await first(p, '/api/benches', 'benches')}`,
    shows: 'Pixel pitch',
  },
  { name: 'people', person: 'Perrin Askvold', path: at('/people'), shows: 'tamsin.orrel@example.org' },
  { name: 'new-person', person: 'Perrin Askvold', path: at('/people/new'), shows: 'E-mail' },
  {
    name: 'edit-person',
    person: 'Perrin Askvold',
    path: async (p) => `/people/${await first(p, '/api/people', 'people')}`,
    shows: 'May sign in',
  },
  { name: 'mail', person: 'Perrin Askvold', path: at('/mail'), shows: /joao\.verrin|tamsin\.orrel/ },
  { name: 'audit', person: 'Perrin Askvold', path: at('/audit'), shows: 'confirm match' },
  { name: 'password', person: 'Tamsin Orrel', path: at('/password'), shows: /present password/i },
  { name: 'not-found', person: 'Tamsin Orrel', path: at('/nowhere'), shows: /work list/i },
];
