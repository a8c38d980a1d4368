import { demoPicture, type DemoExposure } from '#server/demo/demo-picture.ts';
import { addBench } from '#shared/contracts/benches.ts';
import { openCase } from '#shared/contracts/cases.ts';
import { uploadExposure, type Exposure } from '#shared/contracts/exposures.ts';
import { listIdentifications, type Identification } from '#shared/contracts/identifications.ts';
import type { Caller } from '#tests/support/caller.ts';
import { until } from '#tests/support/test-app.ts';

export const benchDraft = {
  name: 'Lens bench',
  note: '',
  geometry: 'lens',
  wavelength: { value: 632.8e-9, u: 0.02e-9 },
  distance: { value: 0.1, u: 0.0001 },
  pixelPitch: { value: 5.2e-6, u: 0.003e-6 },
  encoding: 'linear',
  bitDepth: 12,
  darkLevel: 40,
  mirrored: false,
} as const;

/** A small, quick, clear picture of a round hole of 0.6 mm on that bench; another seed makes another file. */
export function pinholePicture(seed = 1): { name: string; bytes: Uint8Array } {
  const exposure: DemoExposure = {
    opening: { family: 'pinhole', values: { diameter: 0.6e-3 } },
    orientation: 0,
    width: 200,
    height: 180,
    center: { x: 103.3, y: 86.2 },
    peak: 0.9,
    seed,
  };
  return { name: `hole-${seed}.png`, bytes: demoPicture(exposure, benchDraft) };
}

export const caseDraft = { title: 'Unknown hole', part: 'Plate 7' };

let names = 0;

/** An open case with one exposure whose identification has ended. */
export async function identifiedCase(
  analyst: Caller,
): Promise<{ caseId: string; exposure: Exposure; identification: Identification }> {
  const bench = await analyst.call(addBench, {
    body: { ...benchDraft, name: `${benchDraft.name} ${++names}` },
  });
  const { id: caseId } = await analyst.call(openCase, { body: caseDraft });
  const exposure = await analyst.call(uploadExposure, {
    params: { caseId },
    body: { benchId: bench.id },
    file: pinholePicture(names),
  });
  const { identifications } = await until(
    () => analyst.call(listIdentifications, { params: { exposureId: exposure.id } }),
    ({ identifications: [newest] }) => newest.state !== 'queued' && newest.state !== 'running',
  );
  return { caseId, exposure, identification: identifications[0] };
}
