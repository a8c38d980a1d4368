import { Link } from 'react-router-dom';
import { familyOf } from '#shared/apertures/registry.ts';
import type { Match } from '#shared/contracts/matches.ts';
import { printTime } from '#src/lib/time.ts';
import { ApertureSketch } from '#src/ui/aperture-sketch.tsx';
import { CandidateSizes } from '#src/ui/candidate-words.tsx';
import { Measured } from '#src/ui/measured.tsx';
import { Table } from '#src/ui/table.tsx';
import { VerdictMark } from '#src/ui/verdict-mark.tsx';
import { decisionLine, stageOfState } from '#src/features/matches/match-words.ts';

/** Matches with what they claim, who put them forward and what was decided. */
export function ReviewTable({ matches }: { matches: readonly Match[] }) {
  return (
    <Table
      caption="Matches"
      rows={matches}
      rowKey={(m) => m.id}
      columns={[
        {
          key: 'case',
          head: 'Case',
          cell: (m) => (
            <>
              <Link to={`/reviews/${m.id}`} className="pressable-link inline-flex min-h-6 items-center">
                {m.caseNumber}, match {m.version}
              </Link>
              <span className="block font-[500] text-ink2">{m.part}</span>
            </>
          ),
        },
        { key: 'state', head: 'State', cell: (m) => <VerdictMark stage={stageOfState[m.state]} /> },
        {
          key: 'claim',
          head: 'Claim, U with k = 2',
          cell: (m) => (
            <span className="flex items-center gap-3">
              <ApertureSketch
                family={m.candidate.family}
                values={m.candidate.values}
                orientation={m.candidate.orientation?.value ?? null}
              />
              <span>
                {familyOf(m.candidate.family).label}, <CandidateSizes candidate={m.candidate} withU />
                {m.candidate.orientation ? (
                  <>
                    ,{' '}
                    <Measured
                      value={m.candidate.orientation.value}
                      u={m.candidate.orientation.u}
                      unit="deg"
                    />
                  </>
                ) : null}
                {m.verdict === 'ambiguous' ? (
                  <span className="label block text-warn">put forward as ambiguous</span>
                ) : null}
              </span>
            </span>
          ),
        },
        {
          key: 'by',
          head: 'Put forward',
          cell: (m) => (
            <>
              <span className="block whitespace-nowrap">{m.submittedBy.name}</span>
              <span className="block whitespace-nowrap text-ink2">{printTime(m.submittedAt)}</span>
            </>
          ),
        },
        {
          key: 'decision',
          head: 'Decision',
          cell: (m) =>
            decisionLine(m, printTime) ??
            (m.whyNot ? <span className="text-ink2">{m.whyNot}</span> : 'open to you'),
        },
      ]}
    />
  );
}
