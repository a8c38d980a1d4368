import { useId, type ButtonHTMLAttributes, type ReactNode } from 'react';
import { Link, type LinkProps } from 'react-router-dom';
import { classNames } from '#src/ui/class-names.ts';
import { KeyCap } from '#src/ui/key-cap.tsx';

/** `go`: the one next step of a screen; `ink`: the local next step; `danger`: cannot be undone; `bare`: a word. */
type Look = 'go' | 'ink' | 'plain' | 'danger' | 'bare';

interface Slot {
  look?: Look;
  small?: boolean;
  /** Printed as a key cap: the key that does the same. */
  keyHint?: string;
}

const looks: Record<Look, string> = {
  go: 'border-seam bg-seam text-on-seam hover:shadow-[inset_0_0_0_1.5px_var(--on-seam)] active:bg-ink active:border-ink active:text-ground',
  ink: 'border-ink bg-ink text-ground hover:shadow-[inset_0_0_0_1.5px_var(--ground)] active:bg-ink2',
  plain: 'border-edge text-ink hover:shadow-[inset_0_0_0_1.5px_var(--ink)] active:bg-ink active:text-ground',
  danger: 'border-bad bg-bad text-ground hover:shadow-[inset_0_0_0_1.5px_var(--ground)] active:bg-ink',
  bare: 'border-transparent px-0! text-ink pressable-link',
};

function slotClass({ look = 'plain', small }: Slot, extra?: string): string {
  return classNames(
    'inline-flex items-center justify-center gap-2 border rounded-full font-[680] whitespace-nowrap select-none',
    small ? 'min-h-7 px-3 text-[12px] leading-4' : 'min-h-9 px-[18px] text-[13px] leading-[18px]',
    looks[look],
    extra,
  );
}

interface ButtonProps extends ButtonHTMLAttributes<HTMLButtonElement>, Slot {
  /** While it works: the label in its -ing form; presses are ignored. */
  busy?: string | false | undefined;
  /** What it still wants; the button stays reachable, presses are ignored, the reason stands beside it. */
  notYet?: string | false | undefined;
}

export function Button(props: ButtonProps) {
  const {
    look,
    small,
    keyHint,
    busy,
    notYet,
    className,
    children,
    onClick,
    type = 'button',
    ...rest
  } = props;
  const reason = useId();
  const blocked = Boolean(busy) || Boolean(notYet);
  const button = (
    <button
      {...rest}
      type={type}
      aria-disabled={blocked || undefined}
      aria-busy={busy ? true : undefined}
      aria-describedby={notYet ? reason : rest['aria-describedby']}
      onClick={(event) => {
        if (blocked) event.preventDefault();
        else onClick?.(event);
      }}
      className={
        notYet
          ? slotClass(
              { look: 'plain', small },
              classNames('border-dashed text-ink3! hover:shadow-none', className),
            )
          : busy
            ? slotClass({ look: 'plain', small }, className)
            : slotClass({ look, small }, className)
      }
    >
      {busy ? <BusyDisc /> : null}
      <span className="grid">
        <span
          className={classNames('[grid-area:1/1]', busy ? 'invisible' : '')}
          aria-hidden={busy ? true : undefined}
        >
          {children}
        </span>
        {busy ? <span className="[grid-area:1/1]">{busy}</span> : null}
      </span>
      {keyHint && !busy ? <KeyCap keys={keyHint} /> : null}
    </button>
  );
  if (!notYet) return button;
  return (
    <span className="inline-flex flex-wrap items-center gap-x-3 gap-y-1">
      {button}
      <span id={reason} className="label text-ink3">
        Wants: {notYet}
      </span>
    </span>
  );
}

type ButtonLinkProps = LinkProps & Slot & { children: ReactNode };

export function ButtonLink({ look, small, keyHint, className, children, ...rest }: ButtonLinkProps) {
  return (
    <Link {...rest} className={slotClass({ look, small }, className)}>
      {children}
      {keyHint ? <KeyCap keys={keyHint} /> : null}
    </Link>
  );
}

function BusyDisc() {
  return (
    <svg viewBox="0 0 16 16" width="14" height="14" aria-hidden="true">
      <path d="M8 1.5a6.5 6.5 0 0 0 0 13z" fill="currentColor" />
      <path
        d="M8 2.3a5.7 5.7 0 0 1 0 11.4"
        fill="none"
        stroke="var(--model)"
        strokeWidth="1.8"
        pathLength="100"
        strokeDasharray="100"
        className="animate-[grow-arc_1.4s_ease-out_infinite]"
      />
    </svg>
  );
}
