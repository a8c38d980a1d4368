import { familyOf } from '#shared/apertures/registry.ts';
import type { Candidate, Outcome } from '#shared/contracts/identifications.ts';
import { CandidateSizes } from '#src/ui/candidate-words.tsx';
import { Measured } from '#src/ui/measured.tsx';
import { inPlay, listed } from '#src/features/identifications/outcome-words.ts';

type Answer = Extract<Outcome, { kind: 'answer' }>;

/** "Slot, 212.4 ± 0.7 by 84.1 ± 0.3 µm, long axis at 27.3° ± 0.1°" */
export function CandidateSentence({ candidate }: { candidate: Candidate }) {
  const family = familyOf(candidate.family);
  return (
    <>
      {family.label}, <CandidateSizes candidate={candidate} withU />
      {candidate.orientation ? (
        <>
          , {family.axis} at{' '}
          <Measured value={candidate.orientation.value} u={candidate.orientation.u} unit="deg" />
        </>
      ) : null}
    </>
  );
}

/** The headline of an answer: the one shape, the shapes that cannot be told apart, or none. */
export function AnswerHeadline({ answer }: { answer: Answer }) {
  const [best] = answer.candidates;
  if (answer.verdict === 'unidentified' || !best) return <>No shape of the catalogue fits</>;
  if (answer.verdict === 'identified') return <CandidateSentence candidate={best} />;
  const rivals = inPlay(answer);
  return rivals.length > 1 ? (
    <>
      <b>
        {listed(
          rivals.map((c) => familyOf(c.family).label),
          'or',
        )}
      </b>
      : this picture does not tell
    </>
  ) : (
    <>
      Perhaps <CandidateSentence candidate={best} />
    </>
  );
}
