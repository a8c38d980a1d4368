import { Link } from 'react-router-dom';
import { address } from '#src/lib/address.ts';
import { printTime } from '#src/lib/time.ts';
import { BenchLine } from '#src/ui/bench-line.tsx';
import { Notice } from '#src/ui/notice.tsx';
import { ProgressBar } from '#src/ui/progress-bar.tsx';
import { StateDisc } from '#src/ui/state-disc.tsx';
import { VerdictMark } from '#src/ui/verdict-mark.tsx';
import { ExposureFacts } from '#src/features/exposures/exposure-facts.tsx';
import { warningWords } from '#src/features/exposures/warning-words.ts';
import { WithdrawExposure } from '#src/features/exposures/withdraw-exposure.tsx';
import { getExposureThumbnail, type Exposure } from '#shared/contracts/exposures.ts';
import type { CaseStage } from '#shared/contracts/cases.ts';

/** The stage that an exposure's newest identification stands for. */
function stageOf(exposure: Exposure): CaseStage {
  const latest = exposure.latest;
  if (!latest) return 'failed';
  if (latest.state === 'queued' || latest.state === 'running') return 'running';
  return latest.verdict ?? 'failed';
}

/** One exposure of a case: picture, what is known at once, warnings, where its identification stands. */
export function ExposureRow({ exposure }: { exposure: Exposure }) {
  const stage = stageOf(exposure);
  const withdrawn = exposure.withdrawn;
  return (
    <li className="grid gap-x-6 gap-y-3 border-b border-rule py-4 sm:grid-cols-[140px_minmax(0,1fr)] lg:grid-cols-[140px_minmax(0,1fr)_minmax(0,1fr)]">
      <StateDisc
        stage={stage}
        thumbnail={address(getExposureThumbnail, { exposureId: exposure.id })}
        progress={exposure.latest?.share ?? null}
        size={132}
        named={false}
      />
      <div className="min-w-0">
        <h3 className="name">
          <Link to={`/exposures/${exposure.id}`} className="pressable-link inline-flex min-h-6 items-center">
            Exposure {exposure.number}
          </Link>
        </h3>
        <p className="break-all text-ink2">
          {exposure.fileName}, {exposure.uploadedBy.name}, {printTime(exposure.uploadedAt)}
        </p>
        {exposure.note ? <p>{exposure.note}</p> : null}
        <p className="label mt-1 mb-2 text-ink3">
          {exposure.bench.name}, version {exposure.bench.version}: <BenchLine bench={exposure.bench} />
        </p>
        <div className="space-y-2">
          {withdrawn ? (
            <Notice tone="bad" lead="Withdrawn.">
              “{withdrawn.reason}”, {withdrawn.by.name}, {printTime(withdrawn.at)}.
            </Notice>
          ) : (
            <>
              {stage === 'running' && exposure.latest ? (
                <ProgressBar share={exposure.latest.share} step={exposure.latest.step} />
              ) : (
                <VerdictMark stage={stage} />
              )}
            </>
          )}
          <p className="flex flex-wrap gap-x-4">
            <Link
              to={`/exposures/${exposure.id}`}
              className="pressable-link inline-flex min-h-6 items-center"
            >
              {stage === 'running' ? 'Watch it' : 'Read the result'}{' '}
              <span className="sr-only">of exposure {exposure.number}</span>
            </Link>
            {exposure.can.withdraw ? <WithdrawExposure exposure={exposure} /> : null}
          </p>
        </div>
      </div>
      <div className="min-w-0 space-y-2 sm:max-lg:col-start-2">
        <ExposureFacts exposure={exposure} />
        {exposure.warnings.map((warning) => (
          <Notice key={warning} tone="warn" lead={warningWords[warning].lead}>
            {warningWords[warning].rest}
          </Notice>
        ))}
      </div>
    </li>
  );
}
