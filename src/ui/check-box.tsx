import { useId, type InputHTMLAttributes, type ReactNode, type Ref } from 'react';
import { FieldNote } from '#src/ui/field.tsx';

interface CheckBoxProps extends Omit<InputHTMLAttributes<HTMLInputElement>, 'className' | 'type'> {
  label: ReactNode;
  hint?: ReactNode;
  error?: string | undefined;
  ref?: Ref<HTMLInputElement>;
}

export function CheckBox({ label, hint, error, ref, ...input }: CheckBoxProps) {
  const note = useId();
  return (
    <div>
      <label className="inline-flex min-h-6 items-center gap-2.5 font-[620]">
        <input
          {...input}
          ref={ref}
          type="checkbox"
          aria-invalid={error ? true : undefined}
          aria-describedby={error || hint ? note : undefined}
          className="size-[18px] shrink-0 accent-ink"
        />
        {label}
      </label>
      <FieldNote id={note} error={error} hint={hint} />
    </div>
  );
}
