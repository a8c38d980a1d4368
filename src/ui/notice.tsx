import type { ReactNode } from 'react';
import { classNames } from '#src/ui/class-names.ts';

type Tone = 'ok' | 'warn' | 'bad' | 'plain';

const tones: Record<Tone, { box: string; lead: string }> = {
  ok: { box: 'border-ok bg-ok-wash', lead: 'text-ok' },
  warn: { box: 'border-warn bg-warn-wash', lead: 'text-warn' },
  bad: { box: 'border-bad bg-bad-wash', lead: 'text-bad' },
  plain: { box: 'border-edge bg-sheet', lead: 'text-ink' },
};

interface NoticeProps {
  tone: Tone;
  /** What happened, in bold; what follows and what to do are the children. */
  lead: ReactNode;
  children?: ReactNode;
  /** Read out at once (`alert`) or when there is time (`status`), where it appears after a deed. */
  role?: 'alert' | 'status';
  className?: string;
}

export function Notice({ tone, lead, children, role, className }: NoticeProps) {
  return (
    <div role={role} className={classNames('border-l-[3px] px-3 py-2.5', tones[tone].box, className)}>
      <b className={classNames('font-[750]', tones[tone].lead)}>{lead}</b> {children}
    </div>
  );
}
