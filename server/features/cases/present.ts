import type { Actor } from '#server/actor.ts';
import {
  isOfMatch,
  leadingOf,
  stageOf,
  waitsFor,
  type Front,
  type NewestMatch,
} from '#server/features/cases/stage.ts';
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
  const stage = stageOf(record.case.state, front, match);
  const ofMatch = match && isOfMatch(stage) ? match : undefined;
  return {
    ...presentBase(record),
    stage,
    exposureCount: front?.exposureCount ?? 0,
    exposureId: ofMatch?.exposureId ?? front?.exposureId ?? null,
    progress: stage === 'running' && front ? { share: front.share ?? 0, step: front.step ?? '' } : null,
    leading: leadingOf(stage, front, match),
    cameBack:
      ofMatch?.decidedAt && ofMatch.decider
        ? { by: ofMatch.decider, at: ofMatch.decidedAt.toISOString(), reason: ofMatch.reason ?? '' }
        : null,
    matchId: match?.id ?? null,
    waitsForYou: waitsFor(actor, stage, match),
  };
}
