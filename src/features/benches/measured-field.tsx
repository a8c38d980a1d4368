import { useController, type Control } from 'react-hook-form';
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
  const value = useController({ control, name: `${name}.value` });
  const u = useController({ control, name: `${name}.u` });
  return (
    <QuantityField
      label={label}
      unit={unit}
      value={value.field.value}
      onValue={value.field.onChange}
      onBlur={value.field.onBlur}
      ref={value.field.ref}
      error={value.fieldState.error?.message}
      u={u.field.value}
      onU={u.field.onChange}
      uRef={u.field.ref}
      uError={u.fieldState.error?.message}
      hint="± standard uncertainty (1 σ)"
    />
  );
}
