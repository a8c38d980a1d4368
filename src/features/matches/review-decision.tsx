import { useQueryClient } from '@tanstack/react-query';
import { useWatch } from 'react-hook-form';
import { call } from '#src/lib/call.ts';
import { usePerson } from '#src/lib/session.ts';
import { useRecordForm } from '#src/lib/use-record-form.ts';
import {
  decideMatch,
  decideMatchSchema,
  decisionSchema,
  signatureMeanings,
  type Match,
} from '#shared/contracts/matches.ts';
import { Button } from '#src/ui/button.tsx';
import { TextField } from '#src/ui/field.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { TextArea } from '#src/ui/text-area.tsx';
import { decisionDeeds } from '#src/features/matches/match-words.ts';

const choices = { confirm: 'Confirm', return: 'Return to the analyst', reject: 'Reject' } as const;

/** The second person's decision: what, why, and the password again under the meaning of the signature. */
export function ReviewDecision({ match }: { match: Match }) {
  const client = useQueryClient();
  const person = usePerson();
  const { form, submit, busy, problem, more } = useRecordForm({
    schema: decideMatchSchema,
    defaults: { decision: 'confirm', reason: '', password: '' },
    fields: ['decision', 'reason', 'password'],
    save: async (body) => {
      await call(decideMatch, { params: { matchId: match.id }, body });
      await client.invalidateQueries();
    },
  });
  const decision = useWatch({ control: form.control, name: 'decision' });
  const errors = form.formState.errors;
  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="space-y-4" aria-label="Decision">
      <fieldset>
        <legend className="label mb-1.5 text-ink2">Decision</legend>
        {decisionSchema.options.map((option) => (
          <label key={option} className="flex min-h-7 items-center gap-2.5">
            <input
              type="radio"
              value={option}
              {...form.register('decision')}
              className="size-4 accent-seam"
            />
            {choices[option]}
          </label>
        ))}
      </fieldset>
      <TextArea
        label={
          decision === 'confirm'
            ? 'Remark, kept with the case (may stay empty)'
            : 'Reason, kept with the case and sent to the analyst'
        }
        {...form.register('reason')}
        error={errors.reason?.message}
      />
      <p className="border-l-[3px] border-edge bg-sheet px-3 py-2.5">
        <b className="font-[750]">Signing as {person?.name ?? 'you'} means:</b> {signatureMeanings[decision]}
      </p>
      <TextField
        label="Your password again"
        type="password"
        autoComplete="current-password"
        {...form.register('password')}
        error={errors.password?.message}
      />
      <ProblemNotice error={problem} more={more} />
      <Button type="submit" look="go" busy={busy && decisionDeeds[decision].busy}>
        {decisionDeeds[decision].label}
      </Button>
    </form>
  );
}
