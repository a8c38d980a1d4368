import { Button } from '#src/ui/button.tsx';
import type { UploadItem } from '#src/features/exposures/use-uploads.ts';

interface UploadRowProps {
  item: UploadItem;
  onSendAgain: () => void;
  onLeaveOut: () => void;
}

const mega = (bytes: number) => (bytes / 1e6).toFixed(bytes < 1e6 ? 2 : 1);

/** A file on its way, or one that was refused: it keeps its place with the server's sentence. */
export function UploadRow({ item, onSendAgain, onLeaveOut }: UploadRowProps) {
  const { file, state, share, problem } = item;
  if (state === 'refused')
    return (
      <li className="border-l-[3px] border-bad bg-bad-wash px-3 py-2.5">
        <div role="alert">
          <p className="reading break-all">{file.name}</p>
          <p className="mb-2">
            <b className="text-bad">{problem?.title}.</b> {problem?.message}
          </p>
        </div>
        <div className="flex gap-3">
          <Button small onClick={onSendAgain}>
            Send again <span className="sr-only">{file.name}</span>
          </Button>
          <Button small look="bare" onClick={onLeaveOut}>
            Leave out <span className="sr-only">{file.name}</span>
          </Button>
        </div>
      </li>
    );
  const sent = share >= 1;
  const percent = Math.round(100 * share);
  return (
    <li className="border-b border-rule py-2">
      <div className="flex items-baseline justify-between gap-4">
        <p className="reading min-w-0 break-all">{file.name}</p>
        <button
          type="button"
          className="pressable-link min-h-6 shrink-0"
          onClick={onLeaveOut}
          aria-label={`Stop sending ${file.name}`}
        >
          Stop
        </button>
      </div>
      <div
        role="progressbar"
        aria-label={`Sending ${file.name}`}
        aria-valuemin={0}
        aria-valuemax={100}
        aria-valuenow={25 * Math.floor(percent / 25)}
        className="my-1 h-1.5 bg-rule"
      >
        <div className="h-full bg-model" style={{ width: `${percent}%` }} />
      </div>
      <p className="label text-model">
        {state === 'waiting'
          ? 'Waits for its turn'
          : sent
            ? 'Arrived; the server reads the picture'
            : `${mega(share * file.size)} of ${mega(file.size)} MB, ${percent}\u00a0%`}
      </p>
    </li>
  );
}
