import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { call } from '#src/lib/call.ts';
import { asProblem, type ApiProblem } from '#src/lib/problem.ts';
import { sessionQuery } from '#src/lib/session.ts';
import { useRecordForm } from '#src/lib/use-record-form.ts';
import { Button } from '#src/ui/button.tsx';
import { TextField } from '#src/ui/field.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { signIn, signInSchema, type SignInOptions } from '#shared/contracts/session.ts';

interface SignInFormProps {
  demoAccounts: SignInOptions['demoAccounts'];
  /** Whether the last try was refused: the picture shows it. */
  onTry: (refused: boolean) => void;
}

export function SignInForm({ demoAccounts, onTry }: SignInFormProps) {
  const client = useQueryClient();
  const enter = async (credentials: { email: string; password: string }) => {
    try {
      const session = await call(signIn, { body: credentials });
      onTry(false);
      client.setQueryData(sessionQuery.queryKey, session);
    } catch (error) {
      onTry(true);
      throw error;
    }
  };
  const { form, submit, busy, problem, more } = useRecordForm({
    schema: signInSchema,
    defaults: { email: '', password: '' },
    fields: ['email', 'password'],
    save: async (values) => {
      try {
        await enter(values);
      } catch (error) {
        form.resetField('password');
        throw error;
      }
    },
  });
  const errors = form.formState.errors;
  const wrong = problem?.code === 'wrong-credentials' ? problem.message : undefined;
  return (
    <>
      <form noValidate onSubmit={(event) => void submit(event)} className="space-y-4">
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
          autoComplete="current-password"
          {...form.register('password')}
          error={errors.password?.message ?? wrong}
        />
        {problem && !wrong && problem.errors.length === 0 ? (
          <ProblemNotice error={problem} more={more} />
        ) : null}
        {wrong ? (
          <p role="alert" className="sr-only">
            {wrong}
          </p>
        ) : null}
        <Button type="submit" look="go" keyHint="Enter" busy={busy && 'Signing in'}>
          Sign in
        </Button>
      </form>
      {demoAccounts.length > 0 ? <DemoAccounts accounts={demoAccounts} onEnter={enter} /> : null}
    </>
  );
}

interface DemoAccountsProps {
  accounts: SignInOptions['demoAccounts'];
  onEnter: (credentials: { email: string; password: string }) => Promise<void>;
}

function DemoAccounts({ accounts, onEnter }: DemoAccountsProps) {
  const [pending, setPending] = useState<string | null>(null);
  const [problem, setProblem] = useState<ApiProblem | null>(null);
  return (
    <section className="mt-9" aria-labelledby="demo-accounts">
      <h2 id="demo-accounts">Demo laboratory</h2>
      <p className="label mb-2 text-ink3">Invented people, parts and pictures. One press signs in.</p>
      <ProblemNotice error={problem} />
      <ul className="border-b border-rule">
        {accounts.map((account) => (
          <li
            key={account.email}
            className="flex items-center justify-between gap-4 border-t border-rule py-1.5"
          >
            <span>
              <b className="font-[720]">{account.name}</b>
              <span className="label block text-ink3">{account.roles.join(', ')}</span>
            </span>
            <Button
              small
              busy={pending === account.email && 'Signing in'}
              aria-label={`Sign in as ${account.name}`}
              onClick={() => {
                setPending(account.email);
                setProblem(null);
                onEnter({ email: account.email, password: account.password })
                  .catch((error: unknown) => setProblem(asProblem(error)))
                  .finally(() => setPending(null));
              }}
            >
              Sign in
            </Button>
          </li>
        ))}
      </ul>
    </section>
  );
}
