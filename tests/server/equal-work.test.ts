import { afterAll, beforeAll, expect, it, vi } from 'vitest';
import * as argon2 from '@node-rs/argon2';
import { demoPeople } from '#server/demo/demo-people.ts';
import { signIn } from '#shared/contracts/session.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';

vi.mock('@node-rs/argon2', async (original) => {
  const real = await original<typeof argon2>();
  return { ...real, verify: vi.fn(real.verify) };
});

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp({ idle: true });
});
afterAll(() => app.close());

it('a sign-in with an unknown address does the same argon2id work as one with a known address', async () => {
  const hashes: string[] = [];
  for (const email of [demoPeople.analyst.email, 'nobody@example.org']) {
    vi.mocked(argon2.verify).mockClear();
    await app.anonymous().refused(signIn, 'wrong-credentials', { body: { email, password: 'wrong' } });
    expect(argon2.verify).toHaveBeenCalledTimes(1);
    hashes.push(String(vi.mocked(argon2.verify).mock.calls[0][0]));
  }
  const costs = hashes.map((hash) => hash.split('$').slice(0, 4).join('$'));
  expect(costs[0]).toMatch(/^\$argon2id\$v=19\$m=\d{5,},t=[2-9],p=1$/);
  expect(costs[1]).toBe(costs[0]);
});
