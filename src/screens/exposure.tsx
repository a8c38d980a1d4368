import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useParams } from 'react-router-dom';
import { address } from '#src/lib/address.ts';
import { useKeys } from '#src/lib/keys.ts';
import { printExactTime } from '#src/lib/time.ts';
import { useTitle } from '#src/lib/title.ts';
import { BenchLine } from '#src/ui/bench-line.tsx';
import { Button } from '#src/ui/button.tsx';
import { FactList } from '#src/ui/fact-list.tsx';
import { Loading } from '#src/ui/loading.tsx';
import { Notice } from '#src/ui/notice.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { VerdictMark } from '#src/ui/verdict-mark.tsx';
import { ExposureFacts, printShare } from '#src/features/exposures/exposure-facts.tsx';
import { exposureQuery, pixelsQuery } from '#src/features/exposures/queries.ts';
import { warningWords } from '#src/features/exposures/warning-words.ts';
import { AnswerNotes, UntoldLine } from '#src/features/identifications/answer-notes.tsx';
import { CandidateList } from '#src/features/identifications/candidate-list.tsx';
import { AnswerHeadline } from '#src/features/identifications/headline.tsx';
import { verdictSentence } from '#src/features/identifications/outcome-words.ts';
import { PatternStage } from '#src/features/identifications/pattern-stage.tsx';
import { PutForward } from '#src/features/identifications/put-forward.tsx';
import { isUnderWay, runsQuery } from '#src/features/identifications/queries.ts';
import { RunAgain } from '#src/features/identifications/run-again.tsx';
import { RunUnderWay } from '#src/features/identifications/run-under-way.tsx';
import { getExposurePicture, type Exposure } from '#shared/contracts/exposures.ts';
import type { Identification } from '#shared/contracts/identifications.ts';
import { grouped } from '#shared/quantities.ts';

export function Component() {
  const { exposureId = '' } = useParams();
  const exposure = useQuery(exposureQuery(exposureId));
  const runs = useQuery(runsQuery(exposureId));
  useTitle(exposure.data ? `${exposure.data.caseNumber}, exposure ${exposure.data.number}` : 'Exposure');
  if (exposure.data && runs.data)
    return (
      <ExposurePage
        exposure={exposure.data}
        runs={runs.data}
        lost={exposure.error ?? runs.error}
        onRetry={() => void Promise.all([exposure.refetch(), runs.refetch()])}
      />
    );
  return (
    <>
      <Sentence>Exposure</Sentence>
      <ProblemNotice
        error={exposure.error ?? runs.error}
        onRetry={() => void Promise.all([exposure.refetch(), runs.refetch()])}
      />
      {exposure.isPending || runs.isPending ? <Loading what="the exposure" /> : null}
    </>
  );
}

interface PageProps {
  exposure: Exposure;
  runs: readonly Identification[];
  lost: unknown;
  onRetry: () => void;
}

function ExposurePage({ exposure, runs, lost, onRetry }: PageProps) {
  const [shownRun, setShownRun] = useState<string | null>(null);
  const run = runs.find((r) => r.id === shownRun) ?? runs[0];
  const answer = run?.outcome?.kind === 'answer' ? run.outcome : null;
  const [choice, setChoice] = useState<{ run: string; index: number } | null>(null);
  const chosen = choice && choice.run === run?.id ? choice.index : 0;
  const setChosen = (index: number) => setChoice(run ? { run: run.id, index } : null);
  const [submitting, setSubmitting] = useState(false);
  const pixels = useQuery(pixelsQuery(exposure.id));
  const candidate = answer?.candidates[Math.min(chosen, answer.candidates.length - 1)];
  useKeys(
    (answer?.candidates ?? []).slice(0, 4).map((_, i) => ({
      keys: String(i + 1),
      label: i === 0 ? 'to 4, candidate' : `candidate ${i + 1}`,
      quiet: i > 0,
      run: () => setChosen(i),
    })),
  );
  return (
    <>
      <Sentence
        below={
          <>
            <Link
              to={`/cases/${exposure.caseId}`}
              className="pressable-link inline-flex min-h-6 items-center"
            >
              {exposure.caseNumber}
            </Link>
            , exposure {exposure.number}, {exposure.fileName}
            {run && runs.length > 1 ? `, run ${run.run} of ${runs.length}` : ''}
          </>
        }
        deeds={
          <>
            {exposure.can.identify && !isUnderWay(runs[0]) ? <RunAgain exposureId={exposure.id} /> : null}
            {run && answer && candidate ? (
              <PutForwardButton run={run} onPress={() => setSubmitting(true)} open={exposure.can.identify} />
            ) : null}
          </>
        }
      >
        <RunHeadline run={run} />
      </Sentence>
      <ProblemNotice error={lost} onRetry={onRetry} className="mb-4" />
      <p aria-live="polite" className="sr-only">
        {answer ? verdictSentence(answer) : ''}
      </p>
      {answer ? (
        <div className="mb-4 space-y-2 border-b border-rule pb-4">
          <p className="flex flex-wrap items-center gap-3">
            <VerdictMark stage={answer.verdict} /> {verdictSentence(answer)}
          </p>
          <UntoldLine answer={answer} />
        </div>
      ) : null}
      {isUnderWay(run) && run ? <RunUnderWay run={run} /> : null}
      {run?.state === 'failed' && run.problem ? (
        <Notice tone="bad" lead={`${run.problem.title}.`} className="mb-4">
          {run.problem.detail}
        </Notice>
      ) : null}
      {run?.state === 'cancelled' ? (
        <Notice tone="warn" lead="Stopped." className="mb-4">
          Nothing was concluded from the picture. Run it again when you want an answer.
        </Notice>
      ) : null}
      <div className="grid gap-x-11 gap-y-8 lg:grid-cols-[minmax(0,1fr)_430px]">
        <div className="min-w-0">
          <ProblemNotice error={pixels.error} onRetry={() => void pixels.refetch()} />
          {pixels.isPending ? <Loading what="the picture" /> : null}
          {pixels.data ? (
            <PatternStage exposure={exposure} codes={pixels.data} candidate={candidate} profiles />
          ) : null}
        </div>
        <div className="min-w-0 space-y-6">
          {answer && answer.candidates.length > 0 ? (
            <CandidateList
              candidates={answer.candidates}
              chosen={chosen}
              onChoose={setChosen}
              claimed={answer.verdict !== 'unidentified'}
            />
          ) : null}
          {answer && candidate && run ? (
            <AnswerNotes
              answer={answer}
              candidate={candidate}
              bench={exposure.bench}
              near={run.nearReferences}
            />
          ) : null}
          <Conditions exposure={exposure} run={run} />
          <RunHistory runs={runs} shown={run?.id} onShow={setShownRun} />
        </div>
      </div>
      {submitting && run && answer && candidate ? (
        <PutForward
          caseId={exposure.caseId}
          run={run}
          candidate={candidate}
          candidateIndex={answer.candidates.indexOf(candidate)}
          ambiguous={answer.verdict === 'ambiguous'}
          onClose={() => setSubmitting(false)}
        />
      ) : null}
    </>
  );
}

function RunHeadline({ run }: { run: Identification | undefined }) {
  if (run?.outcome?.kind === 'answer') return <AnswerHeadline answer={run.outcome} />;
  if (isUnderWay(run)) return <>The picture is being identified</>;
  if (run?.state === 'cancelled') return <>The identification was stopped</>;
  return <>The picture could not be identified</>;
}

function PutForwardButton({
  run,
  open,
  onPress,
}: {
  run: Identification;
  open: boolean;
  onPress: () => void;
}) {
  if (run.can.submit)
    return (
      <Button look="go" onClick={onPress}>
        Put forward for review
      </Button>
    );
  const unnamed = run.outcome?.kind === 'answer' && run.outcome.verdict === 'unidentified';
  if (!open || !unnamed) return null;
  return <Button notYet="a shape that fits; take another exposure">Put forward for review</Button>;
}

/** Two figures, without an exponent where a plain number will do. */
const short = (n: number) =>
  n >= 1e-4 || n === 0 ? grouped(String(Number(n.toPrecision(2)))) : n.toExponential(0);

/** What the answer rests on: exposure, bench copy, noise, hash, who and when. */
function Conditions({ exposure, run }: { exposure: Exposure; run: Identification | undefined }) {
  const picture = run?.outcome?.picture ?? exposure.facts;
  return (
    <section aria-label="Exposure and bench">
      <h2 className="pb-1">Exposure and bench</h2>
      <ExposureFacts exposure={exposure} />
      <FactList
        facts={[
          { name: 'Left out of the fit', value: printShare(picture.maskedShare) },
          {
            name: 'Noise, variance in counts',
            value: picture.noise
              ? `${short(picture.noise.a)} + ${short(picture.noise.b)} I${picture.noise.c > 1e-8 ? ` + ${short(picture.noise.c)} I\u00b2` : ''}`
              : 'not known',
          },
          { name: 'Bench', value: `${exposure.bench.name}, version ${exposure.bench.version}` },
          { name: 'Bench values', value: <BenchLine bench={exposure.bench} /> },
          { name: 'Taken in', value: `${exposure.uploadedBy.name}, ${printExactTime(exposure.uploadedAt)}` },
          ...(run ? [{ name: 'Engine, atlas', value: `${run.engineVersion}, ${run.atlasVersion}` }] : []),
        ]}
      />
      <p className="label py-1.5 break-all text-ink3">SHA-256 {exposure.sha256}</p>
      <div className="space-y-2">
        {exposure.warnings.map((warning) => (
          <Notice key={warning} tone="warn" lead={warningWords[warning].lead}>
            {warningWords[warning].rest}
          </Notice>
        ))}
      </div>
      <p className="pt-2">
        <a
          href={address(getExposurePicture, { exposureId: exposure.id })}
          download
          className="pressable-link inline-flex min-h-6 items-center"
        >
          Download the original
        </a>
      </p>
    </section>
  );
}

const stateWords: Record<Identification['state'], string> = {
  queued: 'waits for its turn',
  running: 'under way',
  done: 'done',
  failed: 'failed',
  cancelled: 'stopped',
};

function RunHistory({
  runs,
  shown,
  onShow,
}: {
  runs: readonly Identification[];
  shown: string | undefined;
  onShow: (id: string) => void;
}) {
  return (
    <section aria-label="Runs">
      <h2 className="pb-1">Runs</h2>
      <ol className="border-b border-rule">
        {runs.map((run) => (
          <li key={run.id} className="flex justify-between gap-4 border-t border-rule py-1.5">
            <button
              type="button"
              className="pressable-link min-h-6"
              aria-current={run.id === shown ? true : undefined}
              onClick={() => onShow(run.id)}
            >
              Run {run.run}
            </button>
            <span className="text-right text-ink2">
              {run.outcome?.kind === 'answer' ? run.outcome.verdict : stateWords[run.state]},{' '}
              {run.startedBy.name}, {printExactTime(run.queuedAt)}
            </span>
          </li>
        ))}
      </ol>
    </section>
  );
}
