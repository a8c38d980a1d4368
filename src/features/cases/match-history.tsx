import { Link } from 'react-router-dom';
import { familyOf } from '#shared/apertures/registry.ts';
import type { Match } from '#shared/contracts/matches.ts';
import { printExactTime } from '#src/lib/time.ts';
import { ApertureSketch } from '#src/ui/aperture-sketch.tsx';
import { CandidateSizes } from '#src/ui/candidate-words.tsx';

const decisionWords = { confirm: 'confirmed it', return: 'sent it back', reject: 'rejected it' } as const;
const stateWords: Record<Match['state'], string> = {
  submitted: 'waits for a decision',
  confirmed: 'confirmed',
  returned: 'sent back',
  rejected: 'rejected',
  superseded: 'superseded by a later one',
};

/** The matches that were put forward for a case, newest first, each with its decision. */
export function MatchHistory({ matches }: { matches: readonly Match[] }) {
  if (matches.length === 0) return <p className="text-ink2">None put forward yet.</p>;
  return (
    <ol className="border-b border-rule">
      {[...matches]
        .sort((a, b) => b.version - a.version)
        .map((match) => (
          <li key={match.id} className="flex gap-3 border-t border-rule py-2.5">
            <ApertureSketch
              family={match.candidate.family}
              values={match.candidate.values}
              orientation={match.candidate.orientation?.value ?? null}
            />
            <div className="min-w-0">
              <p>
                <Link to={`/reviews/${match.id}`} className="pressable-link inline-flex min-h-6 items-center">
                  Match {match.version}
                </Link>{' '}
                {stateWords[match.state]}
              </p>
              <p>
                {familyOf(match.candidate.family).label}, <CandidateSizes candidate={match.candidate} withU />
              </p>
              <p className="label text-ink3">
                Put forward by {match.submittedBy.name}, {printExactTime(match.submittedAt)}.{' '}
                {match.comment ? `“${match.comment}”` : ''}
              </p>
              {match.decision ? (
                <p className="label text-ink3">
                  {match.decision.by.name} {decisionWords[match.decision.decision]},{' '}
                  {printExactTime(match.decision.at)}.{' '}
                  {match.decision.reason ? `“${match.decision.reason}”` : ''}
                </p>
              ) : null}
            </div>
          </li>
        ))}
    </ol>
  );
}
