import { useState, type Ref } from 'react';
import { fromSi, parseNumber, toSi, type Unit } from '#shared/quantities.ts';

/** Metres, radians or a plain number; `null` when empty, NaN when what was typed is no number. */
export type TypedNumber = number | null;

interface NumberInputProps {
  value: TypedNumber | undefined;
  onValue: (value: TypedNumber) => void;
  unit: Unit | null;
  onBlur?: (() => void) | undefined;
  ref?: Ref<HTMLInputElement> | undefined;
  id?: string | undefined;
  className?: string;
  'aria-label'?: string | undefined;
  'aria-describedby'?: string | undefined;
  'aria-invalid'?: true | undefined;
}

function print(value: TypedNumber | undefined, unit: Unit | null): string {
  if (value === null || value === undefined || Number.isNaN(value)) return '';
  return String(unit ? fromSi(value, unit) : value);
}

function read(text: string, unit: Unit | null): TypedNumber {
  if (text.trim() === '') return null;
  const number = parseNumber(text);
  if (number === null) return NaN;
  return unit ? toSi(number, unit) : number;
}

/** Text that stands for a number: point or comma, SI outside, a person's unit inside. What was typed stays as typed. */
export function NumberInput({ value, onValue, unit, ref, className, ...input }: NumberInputProps) {
  const [typed, setTyped] = useState({ text: print(value, unit), value: value ?? null, unit });
  const foreign = !Object.is(value ?? null, typed.value) || unit !== typed.unit;
  if (foreign) setTyped({ text: print(value, unit), value: value ?? null, unit });
  return (
    <input
      {...input}
      ref={ref}
      type="text"
      inputMode="decimal"
      autoComplete="off"
      className={className}
      value={foreign ? print(value, unit) : typed.text}
      onChange={(event) => {
        const next = read(event.target.value, unit);
        setTyped({ text: event.target.value, value: next, unit });
        onValue(next);
      }}
    />
  );
}
