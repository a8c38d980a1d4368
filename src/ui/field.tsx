import { useId, type InputHTMLAttributes, type ReactNode, type Ref } from 'react';
import { classNames } from '#src/ui/class-names.ts';

interface FrameProps {
  label: ReactNode;
  hint?: ReactNode;
  /** Cause and way out; colours the field and is read with it. */
  error?: string | undefined;
  className?: string | undefined;
}

export interface FieldProps extends FrameProps {
  children: (control: {
    id: string;
    'aria-describedby': string | undefined;
    'aria-invalid': true | undefined;
  }) => ReactNode;
}

/** Label above, control, then the error or else the hint; tied together for readers of the screen. */
export function Field({ label, hint, error, className, children }: FieldProps) {
  const id = useId();
  const note = useId();
  return (
    <div className={classNames('min-w-0', className)}>
      <label htmlFor={id} className="label mb-1 block text-ink2">
        {label}
      </label>
      {children({
        id,
        'aria-describedby': error || hint ? note : undefined,
        'aria-invalid': error ? true : undefined,
      })}
      <FieldNote id={note} error={error} hint={hint} />
    </div>
  );
}

export function FieldNote({ id, error, hint }: { id: string; error?: string | undefined; hint?: ReactNode }) {
  if (!error && !hint) return null;
  return (
    <p id={id} className={classNames('label mt-1', error ? 'text-bad' : 'text-ink3')}>
      {error ?? hint}
    </p>
  );
}

/** The surface of every control that is typed into: raised, ruled below, bad-wash where refused. */
export function controlClass(refused: boolean): string {
  return classNames(
    'reading w-full min-w-0 border-b px-2.5 py-[6px] outline-offset-0 focus-visible:relative focus-visible:z-1',
    refused
      ? 'bg-bad-wash border-bad shadow-[inset_0_-1px_0_var(--bad)]'
      : 'bg-raised border-edge hover:border-ink',
  );
}

interface TextFieldProps extends FrameProps, Omit<InputHTMLAttributes<HTMLInputElement>, 'className'> {
  ref?: Ref<HTMLInputElement>;
}

export function TextField({ label, hint, error, className, ref, ...input }: TextFieldProps) {
  return (
    <Field label={label} hint={hint} error={error} className={className}>
      {(control) => (
        <input type="text" {...input} {...control} ref={ref} className={controlClass(Boolean(error))} />
      )}
    </Field>
  );
}
