import type { CaseStage } from '#shared/contracts/cases.ts';
import { classNames } from '#src/ui/class-names.ts';
import { stageWords } from '#src/ui/stage-words.ts';

const tones: Record<CaseStage, string> = {
  'no-exposure': 'bg-sheet text-ink2',
  running: 'bg-model-wash text-model',
  failed: 'bg-bad-wash text-bad',
  identified: 'bg-ok-wash text-ok',
  ambiguous: 'bg-warn-wash text-warn',
  unidentified: 'bg-bad-wash text-bad',
  'in-review': 'bg-model-wash text-model',
  returned: 'bg-warn-wash text-warn',
  rejected: 'bg-bad-wash text-bad',
  confirmed: 'bg-ok-wash text-ok',
};

/** A verdict (identified, ambiguous, unidentified) or stage as a square-cornered label: glyph and word. */
export function VerdictMark({ stage }: { stage: CaseStage }) {
  return (
    <span
      className={classNames(
        'inline-flex min-h-[26px] items-center gap-2 px-2.5 text-[13px] leading-[18px] font-[680]',
        tones[stage],
      )}
    >
      <svg viewBox="0 0 16 16" width="15" height="15" aria-hidden="true">
        <StageGlyph stage={stage} />
      </svg>
      {stageWords[stage]}
    </span>
  );
}

const left = 'M10.6 1.9A6.6 6.6 0 1 0 5.4 14.1z';
const right = 'M10.6 1.9A6.6 6.6 0 0 1 5.4 14.1z';
const line = { fill: 'none', stroke: 'currentColor', strokeWidth: 1.6 } as const;

function StageGlyph({ stage }: { stage: CaseStage }) {
  switch (stage) {
    case 'no-exposure':
      return <circle cx="8" cy="8" r="6.4" {...line} strokeDasharray="2 2" />;
    case 'running':
      return (
        <>
          <path d={left} fill="currentColor" />
          <path d="M10.8 2.3A6.3 6.3 0 0 1 14 9" {...line} />
        </>
      );
    case 'failed':
      return (
        <>
          <path d={left} fill="currentColor" />
          <path d="m9.5 6 5 5M14.5 6l-5 5" {...line} />
        </>
      );
    case 'identified':
      return (
        <>
          <circle cx="8" cy="8" r="6.6" fill="currentColor" opacity="0.45" />
          <path d={left} fill="currentColor" />
          <path d="M11.8 0 4.2 16" {...line} strokeWidth={1} />
        </>
      );
    case 'ambiguous':
      return (
        <>
          <path d={left} fill="currentColor" />
          <path d={right} {...line} strokeWidth={1.2} />
          <path d="m8 8 6 2.6" {...line} />
        </>
      );
    case 'unidentified':
      return (
        <>
          <path d={left} fill="currentColor" />
          <path d={right} {...line} strokeWidth={1.2} strokeDasharray="1.6 1.8" />
        </>
      );
    case 'in-review':
      return (
        <>
          <circle cx="8" cy="8" r="6.4" {...line} />
          <path d="M8 1.6v12.8" {...line} />
        </>
      );
    case 'returned':
      return (
        <>
          <path d={left} fill="currentColor" transform="translate(0.6 -1.4)" />
          <path d={right} fill="currentColor" opacity="0.55" transform="translate(-0.6 1.6)" />
        </>
      );
    case 'rejected':
      return (
        <>
          <circle cx="8" cy="8" r="6.4" {...line} />
          <path d="m4 4 8 8" {...line} />
        </>
      );
    case 'confirmed':
      return (
        <>
          <circle cx="8" cy="8" r="4" fill="currentColor" />
          <circle cx="8" cy="8" r="6.9" {...line} strokeWidth={1.4} />
        </>
      );
  }
}
