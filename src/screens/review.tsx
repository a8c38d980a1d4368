import { useQuery } from '@tanstack/react-query';
import { Link, useParams } from 'react-router-dom';
import { printExactTime } from '#src/lib/time.ts';
import { useTitle } from '#src/lib/title.ts';
import { ApertureSketch } from '#src/ui/aperture-sketch.tsx';
import { Loading } from '#src/ui/loading.tsx';
import { Notice } from '#src/ui/notice.tsx';
import { ProblemNotice } from '#src/ui/problem-notice.tsx';
import { Sentence } from '#src/ui/sentence.tsx';
import { VerdictMark } from '#src/ui/verdict-mark.tsx';
import { exposureQuery, pixelsQuery } from '#src/features/exposures/queries.ts';
import { UntoldLine } from '#src/features/identifications/answer-notes.tsx';
import { CandidateSentence } from '#src/features/identifications/headline.tsx';
import { PatternStage } from '#src/features/identifications/pattern-stage.tsx';
import { runQuery } from '#src/features/identifications/queries.ts';
import { Claims } from '#src/features/matches/claims.tsx';
import { decisionLine, stageOfState, stateWords } from '#src/features/matches/match-words.ts';
import { matchQuery } from '#src/features/matches/queries.ts';
import { ReviewDecision } from '#src/features/matches/review-decision.tsx';
import type { Match } from '#shared/contracts/matches.ts';

type MatchWithHistory = Match & { earlier: Match[] };

export function Component() {
  const { matchId = '' } = useParams();
  const match = useQuery(matchQuery(matchId));
  useTitle(match.data ? `${match.data.caseNumber}, match ${match.data.version}` : 'Review');
  if (match.data) return <ReviewPage match={match.data} />;
  return (
    <>
      <Sentence>Review</Sentence>
      <ProblemNotice error={match.error} onRetry={() => void match.refetch()} />
      {match.isPending ? <Loading what="the match" /> : null}
    </>
  );
}

function ReviewPage({ match }: { match: MatchWithHistory }) {
  const run = useQuery(runQuery(match.identificationId));
  const answer = run.data?.outcome?.kind === 'answer' ? run.data.outcome : null;
  const runnerUp = answer?.candidates.find((_, i) => i !== match.candidateIndex);
  return (
    <>
      <Sentence
        below={
          <>
            <Link to={`/cases/${match.caseId}`} className="pressable-link inline-flex min-h-6 items-center">
              {match.caseNumber}
            </Link>
            , {match.caseTitle}, {match.part}. Match {match.version}, put forward by {match.submittedBy.name},{' '}
            {printExactTime(match.submittedAt)}
          </>
        }
      >
        <CandidateSentence candidate={match.candidate} />
      </Sentence>
      <div className="mb-4 space-y-2 border-b border-rule pb-4">
        <p className="flex flex-wrap items-center gap-3">
          <VerdictMark stage={stageOfState[match.state]} />
          <span>
            The match {stateWords[match.state]}. The engine&rsquo;s verdict: {match.verdict}.
          </span>
        </p>
        <UntoldLine answer={{ untold: match.untold, candidates: [match.candidate] }} />
      </div>
      <div className="grid gap-x-11 gap-y-8 lg:grid-cols-[minmax(0,1fr)_430px]">
        <div className="min-w-0 space-y-7">
          <Evidence match={match} />
          <section aria-label="Claims">
            <h2 className="pb-2">Claims</h2>
            <ProblemNotice error={run.error} onRetry={() => void run.refetch()} />
            <Claims candidate={match.candidate} farField={match.farField} runnerUp={runnerUp} />
          </section>
        </div>
        <div className="min-w-0 space-y-7">
          <section aria-label="Comment">
            <h2 className="pb-1">Comment of {match.submittedBy.name}</h2>
            <p className="whitespace-pre-line text-ink2">{match.comment || 'None.'}</p>
          </section>
          <section aria-label="Your decision">
            <h2 className="pb-2">Decision</h2>
            <DecisionPart match={match} />
          </section>
          <History match={match} />
        </div>
      </div>
    </>
  );
}

function DecisionPart({ match }: { match: Match }) {
  if (match.can.decide) return <ReviewDecision match={match} />;
  if (match.decision)
    return (
      <div className="space-y-2">
        <Notice tone={match.decision.decision === 'confirm' ? 'ok' : 'warn'} lead="Signed.">
          {decisionLine(match, printExactTime)}
        </Notice>
        <p className="label text-ink3">Meaning of the signature: {match.decision.meaning}</p>
      </div>
    );
  return <Notice tone="plain" lead={match.whyNot ?? 'Nothing is open here.'} />;
}

/** The picture with the match's own simulation: what the decision rests on. */
function Evidence({ match }: { match: Match }) {
  const exposure = useQuery(exposureQuery(match.exposureId));
  const pixels = useQuery(pixelsQuery(match.exposureId));
  return (
    <>
      <ProblemNotice
        error={exposure.error ?? pixels.error}
        onRetry={() => void Promise.all([exposure.refetch(), pixels.refetch()])}
      />
      {exposure.isPending || pixels.isPending ? <Loading what="the picture" /> : null}
      {exposure.data && pixels.data ? (
        <>
          <PatternStage exposure={exposure.data} codes={pixels.data} candidate={match.candidate} profiles />
          <p className="pt-1">
            <Link
              to={`/exposures/${match.exposureId}`}
              className="pressable-link inline-flex min-h-6 items-center"
            >
              Open the exposure with all candidates
            </Link>
          </p>
        </>
      ) : null}
    </>
  );
}

function History({ match }: { match: MatchWithHistory }) {
  if (match.earlier.length === 0) return null;
  return (
    <section aria-label="Earlier matches">
      <h2 className="pb-1">Earlier matches of this case</h2>
      <ol className="border-b border-rule">
        {match.earlier.map((m) => (
          <li key={m.id} className="flex gap-3 border-t border-rule py-2.5">
            <ApertureSketch
              family={m.candidate.family}
              values={m.candidate.values}
              orientation={m.candidate.orientation?.value ?? null}
            />
            <div className="min-w-0">
              <Link to={`/reviews/${m.id}`} className="pressable-link inline-flex min-h-6 items-center">
                Match {m.version}
              </Link>{' '}
              <CandidateSentence candidate={m.candidate} />
              <p className="label text-ink3">{decisionLine(m, printExactTime) ?? stateWords[m.state]}</p>
            </div>
          </li>
        ))}
      </ol>
    </section>
  );
}
