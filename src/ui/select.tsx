import type { ReactNode, Ref, SelectHTMLAttributes } from 'react';
import { classNames } from '#src/ui/class-names.ts';
import { Field, controlClass } from '#src/ui/field.tsx';

interface SelectProps extends Omit<SelectHTMLAttributes<HTMLSelectElement>, 'className'> {
  label: ReactNode;
  hint?: ReactNode;
  error?: string | undefined;
  className?: string;
  options: readonly { value: string; label: string }[];
  ref?: Ref<HTMLSelectElement>;
}

export function Select({ label, hint, error, className, options, ref, ...select }: SelectProps) {
  return (
    <Field label={label} hint={hint} error={error} className={className}>
      {(control) => (
        <span className="relative block">
          <select
            {...select}
            {...control}
            ref={ref}
            className={classNames(controlClass(Boolean(error)), 'h-[33px] appearance-none pr-8')}
          >
            {options.map((option) => (
              <option key={option.value} value={option.value}>
                {option.label}
              </option>
            ))}
          </select>
          <svg
            viewBox="0 0 16 16"
            width="12"
            height="12"
            aria-hidden="true"
            className="pointer-events-none absolute top-[11px] right-2.5"
            fill="none"
            stroke="currentColor"
            strokeWidth="1.6"
          >
            <path d="m3 5.5 5 5 5-5" />
          </svg>
        </span>
      )}
    </Field>
  );
}
