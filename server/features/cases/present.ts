import type { Actor } from '#server/actor.ts';
import { leadingOf, stageOf, waitsFor, type Front, type NewestMatch } from '#server/features/cases/stage.ts';
import type { CaseRecord } from '#server/features/cases/store.ts';
import type { CaseRow } from '#shared/contracts/cases.ts';

export function presentBase(record: NonNullable<CaseRecord>) {
  const { id, number, title, part, lot, specimen, question, drawing, state, version, createdAt, updatedAt } =
    record.case;
  return {
    id,
    number,
    title,
    part,
    lot,
    specimen,
    question,
    drawing,
    state,
    version,
    createdBy: record.createdBy,
    createdAt: createdAt.toISOString(),
    updatedAt: updatedAt.toISOString(),
  };
}

export function presentRow(
  record: NonNullable<CaseRecord>,
  front: Front | undefined,
  match: NewestMatch | undefined,
  actor: Actor,
): CaseRow {
  const stage = stageOf(front, match);
  const ofMatch = match && ['in-review', 'returned', 'rejected', 'confirmed'].includes(stage);
  const came =
    match?.decidedAt &&
    match.decider &&
    (stage === 'returned' || stage === 'rejected' || stage === 'confirmed');
  return {
    ...presentBase(record),
    stage,
    exposureCount: front?.exposureCount ?? 0,
    exposureId: ofMatch ? match.exposureId : (front?.exposureId ?? null),
    progress: stage === 'running' && front ? { share: front.share ?? 0, step: front.step ?? '' } : null,
    leading: leadingOf(stage, front, match),
    cameBack:
      came && match.decidedAt && match.decider
        ? { by: match.decider, at: match.decidedAt.toISOString(), reason: match.reason ?? '' }
        : null,
    matchId: match?.id ?? null,
    waitsForYou: waitsFor(actor, stage, match),
  };
}
