import type { z } from 'zod';
import { useRecordForm } from '#src/lib/use-record-form.ts';
import { Button, ButtonLink } from '#src/ui/button.tsx';
import { TextField } from '#src/ui/field.tsx';
import { Notice } from '#src/ui/notice.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { TextArea } from '#src/ui/text-area.tsx';
import { DrawingFields } from '#src/features/cases/drawing-fields.tsx';
import { caseDraftSchema, type Case } from '#shared/contracts/cases.ts';

export type CaseDraft = z.output<typeof caseDraftSchema>;
export type CaseInput = z.input<typeof caseDraftSchema>;

interface CaseFormProps {
  /** Null for a new case. */
  stored: Case | null;
  save: (draft: CaseDraft) => Promise<void>;
  /** Shown where somebody else changed the case meanwhile. */
  onTakeTheirs?: () => void;
  leaveTo: string;
}

export function CaseForm({ stored, save, onTakeTheirs, leaveTo }: CaseFormProps) {
  const { form, submit, busy, problem, more } = useRecordForm({
    schema: caseDraftSchema,
    defaults: stored ?? blank,
    fields: Object.keys(blank),
    save,
    tidy: withoutEmptyLimits,
  });
  const errors = form.formState.errors;
  const stale = problem?.code === 'stale-edit';
  return (
    <form noValidate onSubmit={(event) => void submit(event)} className="max-w-[1080px]">
      <div className="grid gap-x-7 gap-y-4 border-b border-rule pb-5 md:grid-cols-3">
        <TextField
          label="Title"
          className="md:col-span-3"
          {...form.register('title')}
          error={errors.title?.message}
          hint="What the case is about, in a line."
        />
        <TextField label="Part" {...form.register('part')} error={errors.part?.message} />
        <TextField label="Lot" {...form.register('lot')} error={errors.lot?.message} />
        <TextField
          label="Specimen and position"
          {...form.register('specimen')}
          error={errors.specimen?.message}
        />
        <TextArea
          label="Question"
          className="md:col-span-3"
          {...form.register('question')}
          error={errors.question?.message}
          hint="What is to be answered: the shape, a size, whether it meets its drawing."
        />
      </div>
      <DrawingFields form={form} />
      <div className="flex flex-wrap items-center gap-3 border-t border-rule pt-4">
        <div className="w-full">
          <ProblemNotice error={stale ? null : problem} more={more} />
          {stale ? (
            <Notice tone="bad" lead={`${problem.title}.`} role="alert">
              {problem.message} What you typed is still here: copy what you need.{' '}
              {onTakeTheirs ? (
                <button type="button" className="pressable-link min-h-6" onClick={onTakeTheirs}>
                  Drop mine and fetch theirs
                </button>
              ) : null}
            </Notice>
          ) : null}
        </div>
        <Button type="submit" look="go" busy={busy && 'Saving'}>
          {stored ? 'Save the case' : 'Open the case'}
        </Button>
        <ButtonLink to={leaveTo}>Leave it</ButtonLink>
      </div>
    </form>
  );
}

const blank: CaseInput = { title: '', part: '', lot: '', specimen: '', question: '', drawing: null };

/** A pair of limits that was left empty is no limit. */
function withoutEmptyLimits(values: CaseInput): CaseInput {
  if (!values.drawing) return values;
  const empty = (n: number | null | undefined) => n === null || n === undefined;
  const limits = Object.fromEntries(
    Object.entries(values.drawing.limits ?? {}).filter(
      ([, limit]) => limit && !(empty(limit.lower) && empty(limit.upper)),
    ),
  );
  return { ...values, drawing: { ...values.drawing, limits } };
}
