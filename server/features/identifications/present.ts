import type { Actor } from '#server/actor.ts';
import type { IdentificationRow } from '#server/features/identifications/store.ts';
import type { Identification, NearReference } from '#shared/contracts/identifications.ts';
import { permits } from '#shared/permissions.ts';

export function presentIdentification(
  row: IdentificationRow,
  nearReferences: NearReference[],
  actor: Actor,
): Identification {
  const i = row.identification;
  const underWay = i.state === 'queued' || i.state === 'running';
  const submittable =
    i.outcome?.kind === 'answer' &&
    i.outcome.verdict !== 'unidentified' &&
    row.caseState === 'open' &&
    row.withdrawnAt === null;
  return {
    id: i.id,
    exposureId: i.exposureId,
    run: i.run,
    state: i.state,
    progress: { share: i.share, step: i.step },
    outcome: i.outcome,
    problem: i.problem,
    nearReferences,
    engineVersion: i.engineVersion,
    atlasVersion: i.atlasVersion,
    startedBy: row.startedBy,
    queuedAt: i.queuedAt.toISOString(),
    startedAt: i.startedAt?.toISOString() ?? null,
    finishedAt: i.finishedAt?.toISOString() ?? null,
    can: {
      cancel: underWay && permits(actor.roles, 'run-identifications'),
      submit: submittable && permits(actor.roles, 'submit-matches'),
    },
  };
}
