interface ProgressBarProps {
  /** 0 … 1 */
  share: number;
  /** What is being done. */
  step: string;
}

/** What is being done, how far, and a bar. Readers of the screen hear quarters only. */
export function ProgressBar({ share, step }: ProgressBarProps) {
  const percent = Math.round(100 * Math.min(1, Math.max(0, share)));
  const sentence = step ? step[0].toUpperCase() + step.slice(1) : 'Waiting for its turn';
  return (
    <span className="block max-w-[210px]">
      <span>
        {sentence}, {percent}&nbsp;%
      </span>
      <span
        role="progressbar"
        aria-label={sentence}
        aria-valuemin={0}
        aria-valuemax={100}
        aria-valuenow={25 * Math.floor(percent / 25)}
        className="mt-1 block h-1.5 bg-rule"
      >
        <span className="block h-full bg-model" style={{ width: `${percent}%` }} />
      </span>
    </span>
  );
}
