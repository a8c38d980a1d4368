import { useState, type ReactNode } from 'react';
import { Controller, useWatch } from 'react-hook-form';
import type { z } from 'zod';
import { useRecordForm } from '#src/lib/use-record-form.ts';
import { Button, ButtonLink } from '#src/ui/button.tsx';
import { CheckBox } from '#src/ui/check-box.tsx';
import { Choice } from '#src/ui/choice.tsx';
import { TextField } from '#src/ui/field.tsx';
import { LaserCautions } from '#src/ui/laser-cautions.tsx';
import { Notice } from '#src/ui/notice.tsx';
import type { TypedNumber } from '#src/ui/number-input.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { QuantityField } from '#src/ui/quantity-field.tsx';
import { Select } from '#src/ui/select.tsx';
import { distanceAdvice, pitchAdvice, wavelengthAdvice } from '#src/features/benches/bench-advice.ts';
import { BenchDrawing } from '#src/features/benches/bench-drawing.tsx';
import { FarFieldLine } from '#src/features/benches/far-field-line.tsx';
import { MeasuredField } from '#src/features/benches/measured-field.tsx';
import { benchDraftSchema, type Bench } from '#shared/contracts/benches.ts';

export type BenchDraft = z.output<typeof benchDraftSchema>;
export type BenchInput = z.input<typeof benchDraftSchema>;

interface BenchFormProps {
  bench: Bench | null;
  save: (draft: BenchDraft) => Promise<void>;
  /** Shown where somebody else changed the bench meanwhile: fetches their values. */
  onTakeTheirs?: () => void;
}

const distanceLabels = {
  sensor: 'Distance',
  screen: 'Distance to the screen',
  lens: 'Focal length',
} as const;
const pitchLabels = {
  sensor: 'Pixel pitch',
  screen: 'Length on the screen per pixel',
  lens: 'Pixel pitch',
} as const;

/** The bench as light travels, its values under each part, each warning where its cause is. */
export function BenchForm({ bench, save, onTakeTheirs }: BenchFormProps) {
  const [expected, setExpected] = useState<TypedNumber>(200e-6);
  const { form, submit, busy, problem, more } = useRecordForm({
    schema: benchDraftSchema,
    defaults: bench ?? blank,
    fields: Object.keys(blank),
    save,
  });
  const { control, register } = form;
  const errors = form.formState.errors;
  const values = useWatch({ control });
  const typed = {
    geometry: values.geometry ?? 'sensor',
    wavelength: values.wavelength?.value ?? null,
    distance: values.distance?.value ?? null,
    pixelPitch: values.pixelPitch?.value ?? null,
    expected,
  };
  return (
    <form noValidate onSubmit={(event) => void submit(event)}>
      <div className="grid gap-x-7 gap-y-3 border-b border-rule pb-4 md:grid-cols-[2fr_3fr]">
        <TextField label="Name" {...register('name')} error={errors.name?.message} />
        <TextField
          label="Note"
          {...register('note')}
          error={errors.note?.message}
          hint="Where it stands, which laser and camera."
        />
      </div>
      <div className="py-4">
        <Controller
          control={control}
          name="geometry"
          render={({ field }) => (
            <Choice
              label="Geometry"
              labelled
              options={[
                { value: 'sensor', label: 'Sensor in the pattern' },
                { value: 'screen', label: 'Camera and screen' },
                { value: 'lens', label: 'Focal plane of a lens' },
              ]}
              value={field.value}
              onChoose={field.onChange}
            />
          )}
        />
      </div>
      <BenchDrawing geometry={typed.geometry} />
      <div className="grid gap-x-7 gap-y-6 pt-4 md:grid-cols-2 lg:grid-cols-[1.15fr_0.8fr_1.6fr_1.3fr]">
        <Part title="Laser">
          <MeasuredField control={control} name="wavelength" label="Wavelength" unit="nm" />
          <Warning advice={wavelengthAdvice(typed)} />
          <LaserCautions wavelength={typed.wavelength} />
        </Part>
        <Part title="Opening">
          <QuantityField
            label="Largest opening expected"
            unit="um"
            value={expected}
            onValue={setExpected}
            hint="A help for this page alone: it sets the far-field limit."
          />
        </Part>
        <Part title={typed.geometry === 'lens' ? 'Lens' : 'Way to the pattern'}>
          <MeasuredField control={control} name="distance" label={distanceLabels[typed.geometry]} unit="mm" />
          {typed.geometry === 'lens' ? (
            <p className="label text-ink3">In the focal plane the far field holds at every focal length.</p>
          ) : (
            <FarFieldLine {...typed} />
          )}
          <Warning advice={distanceAdvice(typed)} />
        </Part>
        <Part title={typed.geometry === 'screen' ? 'Screen and camera' : 'Sensor'}>
          <MeasuredField control={control} name="pixelPitch" label={pitchLabels[typed.geometry]} unit="um" />
          <Warning advice={pitchAdvice(typed)} />
          <div className="grid grid-cols-2 gap-3">
            <Controller
              control={control}
              name="bitDepth"
              render={({ field }) => (
                <Select
                  label="Depth"
                  options={[8, 10, 12, 14, 16].map((bits) => ({ value: String(bits), label: `${bits} bit` }))}
                  ref={field.ref}
                  value={String(field.value)}
                  onBlur={field.onBlur}
                  onChange={(event) => field.onChange(Number(event.target.value))}
                  error={errors.bitDepth?.message}
                />
              )}
            />
            <Controller
              control={control}
              name="darkLevel"
              render={({ field }) => (
                <QuantityField
                  label="Dark level, codes"
                  unit={null}
                  value={field.value}
                  onValue={field.onChange}
                  onBlur={field.onBlur}
                  ref={field.ref}
                  error={errors.darkLevel?.message}
                  hint="Empty: not known."
                />
              )}
            />
          </div>
          <Select
            label="Encoding"
            {...register('encoding')}
            options={[
              { value: 'linear', label: 'Linear: codes follow the light' },
              { value: 'srgb', label: 'sRGB: photograph for viewing' },
            ]}
            error={errors.encoding?.message}
          />
          <CheckBox
            label="The camera sees the pattern mirrored"
            hint="Then the specimen’s own orientation is shown beside the picture’s."
            {...register('mirrored')}
          />
        </Part>
      </div>
      <div className="mt-6 flex flex-wrap items-center gap-3 border-t border-rule pt-4">
        <div className="w-full">
          <ProblemNotice error={problem?.code === 'stale-edit' ? null : problem} more={more} />
          {problem?.code === 'stale-edit' ? (
            <Notice tone="bad" lead={`${problem.title}.`} role="alert">
              {problem.message} What you typed is still here.{' '}
              {onTakeTheirs ? (
                <button type="button" className="pressable-link min-h-6" onClick={onTakeTheirs}>
                  Drop mine and fetch theirs
                </button>
              ) : null}
            </Notice>
          ) : null}
        </div>
        <Button type="submit" look="go" busy={busy && 'Saving'}>
          {bench ? 'Save the bench' : 'Add the bench'}
        </Button>
        <ButtonLink to="/benches">Leave it</ButtonLink>
        {bench ? (
          <span className="label text-ink3">
            Exposures keep the values they were taken with; a change holds for later ones.
          </span>
        ) : null}
      </div>
    </form>
  );
}

const blank = {
  name: '',
  note: '',
  geometry: 'sensor',
  wavelength: { value: 632.8e-9, u: 0.1e-9 },
  distance: { value: null, u: null } as unknown as { value: number; u: number },
  pixelPitch: { value: null, u: null } as unknown as { value: number; u: number },
  encoding: 'linear',
  bitDepth: 12,
  darkLevel: null,
  mirrored: false,
} satisfies BenchInput;

function Part({ title, children }: { title: string; children: ReactNode }) {
  return (
    <section className="min-w-0 space-y-3">
      <h2>{title}</h2>
      {children}
    </section>
  );
}

function Warning({ advice }: { advice: { lead: string; rest: string } | null }) {
  return (
    <div aria-live="polite">
      {advice ? (
        <Notice tone="warn" lead={advice.lead}>
          {advice.rest}
        </Notice>
      ) : null}
    </div>
  );
}
