import type { Actor } from '#server/actor.ts';
import { farFieldForDrawing, warningsOf } from '#server/features/exposures/far-field-for-drawing.ts';
import { mayIdentify, mayWithdraw } from '#server/features/exposures/policy.ts';
import type { ExposureRow } from '#server/features/exposures/store.ts';
import type { Exposure } from '#shared/contracts/exposures.ts';

export function presentExposure(row: ExposureRow, latest: Exposure['latest'], actor: Actor): Exposure {
  const e = row.exposure;
  return {
    id: e.id,
    caseId: e.caseId,
    caseNumber: row.caseNumber,
    number: e.number,
    fileName: e.fileName,
    sha256: e.sha256,
    byteSize: e.byteSize,
    format: e.format,
    width: e.width,
    height: e.height,
    bitDepth: e.bitDepth,
    fullScale: e.fullScale,
    codeStep: e.codeStep,
    lossy: e.lossy,
    channel: e.channel,
    note: e.note,
    bench: e.bench,
    facts: e.facts,
    farFieldForDrawing: farFieldForDrawing(e.bench, row.drawing),
    warnings: warningsOf(e, e.facts, e.bench, row.drawing),
    uploadedBy: row.uploader,
    uploadedAt: e.uploadedAt.toISOString(),
    withdrawn:
      e.withdrawnAt && row.withdrawer
        ? { by: row.withdrawer, at: e.withdrawnAt.toISOString(), reason: e.withdrawnReason ?? '' }
        : null,
    latest,
    can: { identify: mayIdentify(actor, row), withdraw: mayWithdraw(actor, row) },
  };
}
