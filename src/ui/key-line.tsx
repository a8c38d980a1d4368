import { useState } from 'react';
import { useActiveKeys, useKeys, useSingleKeys } from '#src/lib/keys.ts';
import { CheckBox } from '#src/ui/check-box.tsx';
import { Dialog } from '#src/ui/dialog.tsx';
import { KeyCap } from '#src/ui/key-cap.tsx';

/** The bottom line: the keys that apply now, and the list of all. */
export function KeyLine() {
  const [open, setOpen] = useState(false);
  const keys = useActiveKeys();
  const single = useSingleKeys();
  useKeys([{ keys: '?', label: 'all keys', quiet: true, run: () => setOpen(true) }]);
  const applies = keys.filter((k) => !k.quiet && (single.on || k.keys.length > 1));
  return (
    <footer className="page-margin sticky bottom-0 z-10 flex min-h-[34px] items-center justify-between gap-6 border-t border-rule bg-ground">
      <ul className="flex h-[33px] flex-wrap items-center gap-x-5 overflow-hidden" aria-label="Keys">
        {applies.map((k) => (
          <li key={k.keys} className="label flex h-[33px] items-center gap-1.5 text-ink2">
            <KeyCap keys={k.keys} />
            <span className="sr-only">{k.keys}: </span>
            {k.label}
          </li>
        ))}
      </ul>
      <button
        type="button"
        className="label flex min-h-6 shrink-0 items-center gap-1.5 text-ink2 hover:text-ink"
        onClick={() => setOpen(true)}
      >
        <KeyCap keys="?" /> all keys
      </button>
      {open ? (
        <Dialog title="Keys that apply now" onClose={() => setOpen(false)}>
          <ul className="mt-2 border-b border-rule">
            {keys.map((k) => (
              <li key={k.keys} className="flex items-center gap-4 border-t border-rule py-1.5">
                <span className="w-24 shrink-0">
                  <KeyCap keys={k.keys} />
                  <span className="sr-only">{k.keys}</span>
                </span>
                {k.label}
              </li>
            ))}
          </ul>
          <div className="mt-3">
            <CheckBox
              label="Single-letter keys"
              hint="Off while typing in any case. Switch them off if speech or a stray press sets them off."
              checked={single.on}
              onChange={(event) => single.set(event.target.checked)}
            />
          </div>
          <button type="button" className="pressable-link mt-3 min-h-6" onClick={() => setOpen(false)}>
            Close
          </button>
        </Dialog>
      ) : null}
    </footer>
  );
}
