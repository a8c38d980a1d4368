import { Controller, useController, type Control } from 'react-hook-form';
import { QuantityField } from '#src/ui/quantity-field.tsx';
import type { BenchDraft, BenchInput } from '#src/features/benches/bench-form.tsx';
import type { Unit } from '#shared/quantities.ts';

interface MeasuredFieldProps {
  control: Control<BenchInput, unknown, BenchDraft>;
  name: 'wavelength' | 'distance' | 'pixelPitch';
  label: string;
  unit: Unit;
}

/** A value of the bench with its standard uncertainty. */
export function MeasuredField({ control, name, label, unit }: MeasuredFieldProps) {
  const u = useController({ control, name: `${name}.u` });
  const { ref: uRef, value: uValue, onChange: onU } = u.field;
  return (
    <Controller
      control={control}
      name={`${name}.value`}
      render={({ field, fieldState }) => (
        <QuantityField
          label={label}
          unit={unit}
          value={field.value}
          onValue={field.onChange}
          onBlur={field.onBlur}
          ref={field.ref}
          error={fieldState.error?.message}
          u={uValue}
          onU={onU}
          uRef={uRef}
          uError={u.fieldState.error?.message}
          hint="± standard uncertainty (1 σ)"
        />
      )}
    />
  );
}
