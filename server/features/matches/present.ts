import type { Actor } from '#server/actor.ts';
import { whyNotDecide } from '#server/features/matches/policy.ts';
import type { MatchRow } from '#server/features/matches/store.ts';
import type { Match } from '#shared/contracts/matches.ts';

export function presentMatch(row: MatchRow, actor: Actor): Match {
  const m = row.match;
  if (row.outcome?.kind !== 'answer')
    throw new Error(`match ${m.id} stands on an identification without an answer`);
  const whyNot = whyNotDecide(actor, m);
  return {
    id: m.id,
    caseId: m.caseId,
    caseNumber: row.case.number,
    caseTitle: row.case.title,
    part: row.case.part,
    version: m.version,
    exposureId: row.exposureId,
    identificationId: m.identificationId,
    candidateIndex: m.candidateIndex,
    candidate: m.candidate,
    verdict: row.outcome.verdict,
    untold: row.outcome.untold,
    farField: row.outcome.farField,
    engineVersion: row.engineVersion,
    atlasVersion: row.atlasVersion,
    comment: m.comment,
    state: m.state,
    submittedBy: { id: row.submitter.id, name: row.submitter.name },
    submittedAt: m.submittedAt.toISOString(),
    decision:
      m.decision && m.decidedAt && row.decider
        ? {
            decision: m.decision,
            by: row.decider,
            at: m.decidedAt.toISOString(),
            reason: m.reason ?? '',
            meaning: m.meaning ?? '',
          }
        : null,
    can: { decide: whyNot === null },
    whyNot: m.state === 'submitted' ? whyNot : null,
  };
}
