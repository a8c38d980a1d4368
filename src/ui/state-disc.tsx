import { useEffect, useRef } from 'react';
import type { CaseStage } from '#shared/contracts/cases.ts';
import { stageWords } from '#src/ui/stage-words.ts';
import { useColouredPicture } from '#src/ui/use-coloured-picture.ts';

interface StateDiscProps {
  stage: CaseStage;
  /** Address of the grey thumbnail; null without exposure. */
  thumbnail: string | null;
  /** 0 … 1 while running. */
  progress?: number | null;
  size?: number;
  /** False where the word stands beside it in the same row. */
  named?: boolean;
}

/** Seam from upper left to lower right; the measured half is always the left one. */
const seamDegrees = 118;
const wholePicture: readonly CaseStage[] = [
  'identified',
  'ambiguous',
  'in-review',
  'returned',
  'rejected',
  'confirmed',
];

/** The small seam figure of a case's state. */
export function StateDisc({ stage, thumbnail, progress, size = 52, named = true }: StateDiscProps) {
  const picture = useColouredPicture(stage === 'no-exposure' ? null : thumbnail);
  const canvas = useRef<HTMLCanvasElement>(null);
  useEffect(() => {
    const context = picture ? canvas.current?.getContext('2d') : null;
    if (picture && context) paint(context, picture, stage);
  }, [picture, stage]);
  return (
    <span
      role={named ? 'img' : undefined}
      aria-label={named ? stageWords[stage] : undefined}
      aria-hidden={named ? undefined : true}
      className="relative block shrink-0"
      style={{ width: size + 8, height: size + 8 }}
    >
      <canvas
        ref={canvas}
        width={192}
        height={192}
        className="absolute inset-1"
        style={{ width: size, height: size }}
      />
      <svg viewBox="-54 -54 108 108" className="absolute inset-0 size-full" aria-hidden="true">
        <Overlay stage={stage} progress={progress ?? 0} />
      </svg>
    </span>
  );
}

function paint(context: CanvasRenderingContext2D, picture: HTMLCanvasElement, stage: CaseStage): void {
  const c = 96;
  const seam = (-seamDegrees * Math.PI) / 180;
  const half = (from: number, shift: number) => {
    context.save();
    context.translate(shift * Math.cos(seam), shift * Math.sin(seam));
    context.beginPath();
    context.arc(c, c, c - Math.abs(shift), from, from + Math.PI);
    context.clip();
    context.drawImage(picture, 0, 0, 192, 192);
    context.restore();
  };
  context.clearRect(0, 0, 192, 192);
  const apart = stage === 'returned' ? 9 : 0;
  half(seam + Math.PI, apart);
  if (wholePicture.includes(stage)) half(seam, -apart);
}

/** Lines keep their width at every size of the disc. */
const thin = { vectorEffect: 'non-scaling-stroke', fill: 'none' } as const;
const hair = { ...thin, stroke: 'var(--edge)', strokeWidth: 1 } as const;

function Overlay({ stage, progress }: { stage: CaseStage; progress: number }) {
  const turned = `rotate(${-seamDegrees})`;
  switch (stage) {
    case 'no-exposure':
      return (
        <>
          <circle r="48" {...hair} strokeDasharray="3 4" />
          <path d="M-34 34 34-34" {...hair} strokeDasharray="3 4" />
        </>
      );
    case 'running':
      return (
        <g transform={turned}>
          <path d="M-48 0H48M48 0A48 48 0 0 1-48 0" {...hair} />
          <path
            d="M48 0A48 48 0 0 1-48 0"
            fill="none"
            stroke="var(--model)"
            strokeWidth="7"
            pathLength="100"
            strokeDasharray={`${Math.max(4, 100 * progress)} 100`}
          />
        </g>
      );
    case 'failed':
      return (
        <g transform={turned}>
          <path d="M-48 0H48" {...hair} />
          <path d="M48 0A48 48 0 0 1-48 0" {...hair} strokeDasharray="3 4" />
        </g>
      );
    case 'unidentified':
      return (
        <g transform={turned}>
          <path d="M-48 0H48" {...hair} />
          <path d="M48 0A48 48 0 0 1-48 0" {...hair} strokeDasharray="3 4" />
          <g stroke="var(--bad)" strokeWidth="1.8">
            <path d="M-36 6-28 30M-20 6-8 41M-3 6 9 41M14 6 24 36M31 6 36 24" />
          </g>
        </g>
      );
    case 'ambiguous':
      return (
        <g transform={turned}>
          <Seam from={-48} to={48} />
          <path d="M0 0V48" {...thin} stroke="var(--over)" strokeWidth="1.3" />
        </g>
      );
    case 'identified':
    case 'in-review':
      return (
        <g transform={turned}>
          <Seam from={-48} to={48} />
          <path d="M-54 0h7M47 0h7" {...thin} stroke="var(--ink)" strokeWidth="1.6" />
          {stage === 'in-review' ? <circle r="52" {...hair} strokeDasharray="3 4" /> : null}
        </g>
      );
    case 'returned':
      return (
        <g transform={turned}>
          <Seam from={-44} to={44} />
        </g>
      );
    case 'rejected':
      return (
        <g transform={turned}>
          <Seam from={-48} to={48} />
          <path d="M0-54V54" {...thin} stroke="var(--bad)" strokeWidth="2.2" />
        </g>
      );
    case 'confirmed':
      return (
        <g transform={turned}>
          <Seam from={-48} to={48} />
          <circle r="51.5" {...thin} stroke="var(--ok)" strokeWidth="2.5" />
        </g>
      );
  }
}

function Seam({ from, to }: { from: number; to: number }) {
  return <path d={`M${from} 0H${to}`} {...thin} stroke="var(--over)" strokeWidth="1.3" />;
}
