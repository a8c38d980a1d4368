import type { BenchValues } from '#shared/contracts/benches.ts';
import type { Candidate, NearReference, Outcome } from '#shared/contracts/identifications.ts';
import { familyOf } from '#shared/apertures/registry.ts';
import { printQuantity } from '#shared/quantities.ts';
import { Notice } from '#src/ui/notice.tsx';
import {
  farFieldSentence,
  specimenOrientation,
  untoldClause,
} from '#src/features/identifications/outcome-words.ts';

type Answer = Extract<Outcome, { kind: 'answer' }>;

/** "Not told by this image: …": always there, under every verdict. */
export function UntoldLine({
  answer,
}: {
  answer: Pick<Answer, 'untold'> & { candidates?: readonly Candidate[] };
}) {
  return (
    <p className="text-ink2">
      <b className="font-[750] text-ink">Not told by this image:</b>{' '}
      {answer.untold.map((u) => untoldClause(u, answer.candidates?.[0])).join('; ')}. U is expanded, k = 2.
    </p>
  );
}

/** Far field, mirrored camera and near references of an answer. */
export function AnswerNotes({
  answer,
  candidate,
  bench,
  near,
}: {
  answer: Answer;
  candidate: Candidate;
  bench: BenchValues;
  near: readonly NearReference[];
}) {
  const own = specimenOrientation(candidate, bench.mirrored);
  return (
    <div className="space-y-2">
      <Notice
        tone={answer.farField.holds ? 'plain' : 'warn'}
        lead={farFieldSentence(answer.farField, bench)}
      />
      {own !== null ? (
        <Notice tone="plain" lead="The camera sees the pattern reversed.">
          On the specimen itself the {familyOf(candidate.family).axis} lies at {printQuantity(own, 'deg', 4)}.
        </Notice>
      ) : null}
      <section aria-label="References near to it">
        <h2 className="pt-2 pb-1">References near to it</h2>
        {near.length === 0 ? (
          <p className="text-ink2">No approved reference is within 5 % of a candidate in every size.</p>
        ) : (
          <ul className="border-b border-rule">
            {near.map((r) => (
              <li
                key={r.referenceId + r.candidate}
                className="flex justify-between gap-4 border-t border-rule py-1.5"
              >
                <span>
                  <b className="font-[720]">{r.number}</b> {r.name}
                </span>
                <span className="text-right text-ink2">
                  {(100 * r.largestDifference).toPrecision(2)} % apart, {r.agrees ? 'inside U' : 'outside U'}
                  {r.candidate > 0 ? `, candidate ${r.candidate + 1}` : ''}
                </span>
              </li>
            ))}
          </ul>
        )}
      </section>
    </div>
  );
}
