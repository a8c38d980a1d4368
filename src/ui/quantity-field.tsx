import { useId, type ReactNode, type Ref } from 'react';
import { classNames } from '#src/ui/class-names.ts';
import { FieldNote } from '#src/ui/field.tsx';
import { NumberInput, type TypedNumber } from '#src/ui/number-input.tsx';
import { units, type Unit } from '#shared/quantities.ts';

interface QuantityFieldProps {
  label: string;
  /** What the label speaks of, where several fields carry the same label: for readers of the screen. */
  of?: string;
  unit: Unit | null;
  /** Metres or radians. */
  value: TypedNumber | undefined;
  onValue: (value: TypedNumber) => void;
  error?: string | undefined;
  /** Its standard uncertainty, in the same unit; without `onU` the field has one half only. */
  u?: TypedNumber | undefined;
  onU?: (u: TypedNumber) => void;
  uError?: string | undefined;
  hint?: ReactNode;
  onBlur?: (() => void) | undefined;
  ref?: Ref<HTMLInputElement> | undefined;
  uRef?: Ref<HTMLInputElement> | undefined;
  className?: string;
}

const notANumber = 'This is not a number. Use digits, with a point or a comma.';

/** A quantity as a pair: value | ± standard uncertainty, one unit. SI in, SI out. */
export function QuantityField(props: QuantityFieldProps) {
  const { label, of, unit, value, onValue, u, onU, hint, onBlur, ref, uRef, className } = props;
  const id = useId();
  const note = useId();
  const error = Number.isNaN(value) ? notANumber : props.error;
  const uError = Number.isNaN(u) ? notANumber : props.uError;
  const unitLabel = unit ? units[unit].label : '';
  const described = error || uError || hint ? note : undefined;
  return (
    <div className={classNames('min-w-0', className)}>
      <label htmlFor={id} className="label mb-1 block text-ink2">
        {label}{' '}
        <span className="sr-only">
          {of ? `of the ${of.toLowerCase()} ` : ''}
          {unitLabel ? `in ${unitLabel}` : ''}
        </span>
      </label>
      <div className="flex gap-[2px]">
        <Half refused={Boolean(error)} suffix={unitLabel} grow>
          <NumberInput
            id={id}
            ref={ref}
            value={value}
            onValue={onValue}
            unit={unit}
            onBlur={onBlur}
            aria-describedby={described}
            aria-invalid={error ? true : undefined}
            className="reading w-full min-w-0 bg-transparent py-[6px] outline-none"
          />
        </Half>
        {onU ? (
          <Half refused={Boolean(uError)} prefix="±">
            <NumberInput
              ref={uRef}
              value={u}
              onValue={onU}
              unit={unit}
              onBlur={onBlur}
              aria-label={`${label}, standard uncertainty in ${unitLabel}`}
              aria-describedby={described}
              aria-invalid={uError ? true : undefined}
              className="reading w-full min-w-0 bg-transparent py-[6px] outline-none"
            />
          </Half>
        ) : null}
      </div>
      <FieldNote id={note} error={[error, uError].filter(Boolean).join(' ') || undefined} hint={hint} />
    </div>
  );
}

interface HalfProps {
  refused: boolean;
  prefix?: string;
  suffix?: string;
  grow?: boolean;
  children: ReactNode;
}

function Half({ refused, prefix, suffix, grow, children }: HalfProps) {
  return (
    <span
      className={classNames(
        'flex min-w-0 items-center gap-1.5 border-b px-2.5 has-focus-visible:outline-3 has-focus-visible:outline-ink',
        grow ? 'flex-[3]' : 'flex-[2]',
        refused
          ? 'border-bad bg-bad-wash shadow-[inset_0_-1px_0_var(--bad)]'
          : 'border-edge bg-raised hover:border-ink',
      )}
    >
      {prefix ? (
        <span aria-hidden="true" className="label text-ink2">
          {prefix}
        </span>
      ) : null}
      {children}
      {suffix ? (
        <span aria-hidden="true" className="label text-ink3">
          {suffix}
        </span>
      ) : null}
    </span>
  );
}
