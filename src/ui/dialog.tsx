import { useEffect, useId, useRef, type ReactNode } from 'react';

interface DialogProps {
  title: string;
  onClose: () => void;
  children: ReactNode;
}

/** A modal in an ink frame; Escape closes. For what can't be undone and for the list of keys. */
export function Dialog({ title, onClose, children }: DialogProps) {
  const ref = useRef<HTMLDialogElement>(null);
  const heading = useId();
  useEffect(() => {
    const dialog = ref.current;
    if (dialog && !dialog.open) dialog.showModal();
    return () => dialog?.close();
  }, []);
  return (
    <dialog
      ref={ref}
      aria-labelledby={heading}
      onCancel={(event) => {
        event.preventDefault();
        onClose();
      }}
      onClick={(event) => {
        if (event.target === ref.current) onClose();
      }}
      className="m-auto max-h-[90dvh] w-[min(520px,calc(100vw-32px))] border-2 border-ink bg-raised text-ink backdrop:bg-ground/70"
    >
      <div className="p-5">
        <h2 id={heading} className="reading mb-1">
          {title}
        </h2>
        {children}
      </div>
    </dialog>
  );
}
