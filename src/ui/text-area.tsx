import type { ReactNode, Ref, TextareaHTMLAttributes } from 'react';
import { classNames } from '#src/ui/class-names.ts';
import { Field, controlClass } from '#src/ui/field.tsx';

interface TextAreaProps extends Omit<TextareaHTMLAttributes<HTMLTextAreaElement>, 'className'> {
  label: ReactNode;
  hint?: ReactNode;
  error?: string | undefined;
  className?: string;
  ref?: Ref<HTMLTextAreaElement>;
}

export function TextArea({ label, hint, error, className, ref, rows = 3, ...area }: TextAreaProps) {
  return (
    <Field label={label} hint={hint} error={error} className={className}>
      {(control) => (
        <textarea
          {...area}
          {...control}
          rows={rows}
          ref={ref}
          className={classNames(controlClass(Boolean(error)), 'block resize-y')}
        />
      )}
    </Field>
  );
}
