import { Controller, useWatch, type FieldError, type UseFormReturn } from 'react-hook-form';
import { ApertureSketch } from '#src/ui/aperture-sketch.tsx';
import { QuantityField } from '#src/ui/quantity-field.tsx';
import { Select } from '#src/ui/select.tsx';
import type { CaseDraft, CaseInput } from '#src/features/cases/case-form.tsx';
import { families, familyOf } from '#shared/apertures/registry.ts';
import type { Parameter } from '#shared/apertures/family.ts';

type CaseFormReturn = UseFormReturn<CaseInput, unknown, CaseDraft>;

const choices = [
  { value: '', label: 'No drawing, or not known' },
  ...families.map((f) => ({ value: f.id, label: f.label })),
];

/** What the drawing says: a family of the catalogue, its sizes, and limits where there are any. */
export function DrawingFields({ form }: { form: CaseFormReturn }) {
  const drawing = useWatch({ control: form.control, name: 'drawing' });
  const family = drawing ? familyOf(drawing.aperture.family) : null;
  const values = drawing?.aperture.values ?? {};
  const sketchable =
    family?.parameters.every((p) => {
      const v = values[p.key];
      return p.nullable ? v === null || v === undefined || v > 0 : v !== null && v !== undefined && v > 0;
    }) ?? false;
  const choose = (id: string) => {
    if (!id) return form.setValue('drawing', null, { shouldDirty: true });
    const empty = Object.fromEntries(familyOf(id).parameters.map((p) => [p.key, null]));
    form.setValue('drawing', { aperture: { family: id, values: empty }, limits: {} }, { shouldDirty: true });
    form.clearErrors('drawing');
  };
  return (
    <section className="grid gap-x-7 gap-y-4 py-5 md:grid-cols-3" aria-labelledby="drawing-title">
      <div className="md:col-span-3">
        <h2 id="drawing-title">Drawing</h2>
        <p className="text-ink2">
          Optional. It is not used to find the shape: it says what the result is held against, and whether the
          bench stands far enough back.
        </p>
      </div>
      <div className="flex items-start gap-4">
        <Select
          label="Shape"
          className="flex-1"
          options={choices}
          value={family?.id ?? ''}
          onChange={(event) => choose(event.target.value)}
          error={form.formState.errors.drawing?.message}
        />
        {family && sketchable ? (
          <ApertureSketch
            family={family.id}
            values={Object.fromEntries(family.parameters.map((p) => [p.key, values[p.key] ?? null]))}
            size={52}
          />
        ) : null}
      </div>
      {family ? (
        <div className="space-y-3 md:col-span-2">
          {family.parameters.map((p) => (
            <SizeRow key={`${family.id}.${p.key}`} form={form} parameter={p} />
          ))}
        </div>
      ) : null}
    </section>
  );
}

function SizeRow({ form, parameter: p }: { form: CaseFormReturn; parameter: Parameter }) {
  // A rule about both limits sits on the pair, not on a half.
  const pair = form.formState.errors.drawing?.limits?.[p.key] as FieldError | undefined;
  return (
    <div className="grid gap-3 sm:grid-cols-3">
      <SizeField
        form={form}
        parameter={p}
        name={`drawing.aperture.values.${p.key}`}
        label={p.label}
        hint={p.nullable ? 'Empty: endless, as the beam sees it.' : undefined}
      />
      <SizeField
        form={form}
        parameter={p}
        name={`drawing.limits.${p.key}.lower`}
        label="Lower limit"
        more={pair?.message}
      />
      <SizeField form={form} parameter={p} name={`drawing.limits.${p.key}.upper`} label="Upper limit" />
    </div>
  );
}

interface SizeFieldProps {
  form: CaseFormReturn;
  parameter: Parameter;
  name: `drawing.aperture.values.${string}` | `drawing.limits.${string}.${'lower' | 'upper'}`;
  label: string;
  hint?: string | undefined;
  more?: string | undefined;
}

function SizeField({ form, parameter, name, label, hint, more }: SizeFieldProps) {
  return (
    <Controller
      control={form.control}
      name={name}
      render={({ field, fieldState }) => (
        <QuantityField
          label={label}
          {...(name.startsWith('drawing.limits') ? { of: parameter.label } : {})}
          unit={parameter.kind === 'length' ? 'um' : null}
          value={field.value ?? null}
          onValue={field.onChange}
          onBlur={field.onBlur}
          ref={field.ref}
          error={
            (name.startsWith('drawing.limits')
              ? limitMessage(fieldState.error)
              : fieldState.error?.message) ?? more
          }
          hint={hint}
        />
      )}
    />
  );
}

function limitMessage(error: FieldError | undefined): string | undefined {
  if (error?.type === 'invalid_type') return 'Give both limits or none.';
  if (error?.type === 'too_small') return 'A limit is greater than zero.';
  return error?.message;
}
