import { useId } from 'react';
import { classNames } from '#src/ui/class-names.ts';

interface ChoiceProps<T extends string> {
  /** What is chosen; read out, and printed above where `labelled`. */
  label: string;
  labelled?: boolean;
  options: readonly { value: T; label: string }[];
  value: T;
  onChoose: (value: T) => void;
}

/** A few alternatives side by side in one slot; radio buttons underneath, so arrow keys move between them. */
export function Choice<T extends string>({ label, labelled, options, value, onChoose }: ChoiceProps<T>) {
  const name = useId();
  return (
    <fieldset className="min-w-0">
      <legend className={labelled ? 'label mb-1 text-ink2' : 'sr-only'}>{label}</legend>
      <div className="inline-flex flex-wrap rounded-full border border-edge p-[2px]">
        {options.map((option) => (
          <label
            key={option.value}
            className={classNames(
              'flex min-h-6 items-center rounded-full px-3 text-[12px] leading-4 font-[640] has-focus-visible:outline-3 has-focus-visible:outline-offset-2 has-focus-visible:outline-ink',
              option.value === value ? 'bg-ink text-ground' : 'text-ink2 hover:text-ink',
            )}
          >
            <input
              type="radio"
              name={name}
              className="sr-only"
              checked={option.value === value}
              onChange={() => onChoose(option.value)}
            />
            {option.label}
          </label>
        ))}
      </div>
    </fieldset>
  );
}
