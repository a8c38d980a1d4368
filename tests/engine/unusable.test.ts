import { describe, expect, it } from 'vitest';
import { identify } from '#server/engine/identify.ts';
import { inspectPicture } from '#server/engine/inspect.ts';
import type { Picture } from '#server/engine/outcome.ts';
import { exposureOf, flatPicture, type ExposureSpec } from '#tests/engine/exposure.ts';

const pinhole: ExposureSpec = { family: 'pinhole', values: { diameter: 120e-6 } };
const { setup } = exposureOf(pinhole);

function reasonsFor(picture: Picture, its = setup): readonly string[] {
  const outcome = identify(picture, its);
  return outcome.kind === 'unusable' ? outcome.reasons : [];
}

describe('a picture that cannot be used', () => {
  it('says that it is black', () => {
    expect(reasonsFor(flatPicture(0), { ...setup, darkLevel: 0 })).toEqual(['all-dark']);
  });

  it('says that it is white', () => {
    expect(reasonsFor(flatPicture(4095))).toEqual(['all-saturated']);
  });

  it('says that it has no contrast', () => {
    expect(reasonsFor(flatPicture(1800, 30))).toEqual(['no-contrast']);
  });

  it('says that more than half of it is saturated', () => {
    const { picture, setup: its } = exposureOf({ ...pinhole, exposure: 4000, finestPeriod: 60 });
    expect(reasonsFor(picture, its)).toEqual(['mostly-saturated']);
  });

  it('says that its fringes are finer than 3.5 pixels', () => {
    const { picture, setup: its } = exposureOf({ ...pinhole, finestPeriod: 2.8, exposure: 20 });
    expect(reasonsFor(picture, its)).toEqual(['fringes-undersampled']);
  });

  it('says that no minimum lies in the frame', () => {
    const { picture, setup: its } = exposureOf({ ...pinhole, finestPeriod: 600 });
    expect(reasonsFor(picture, its)).toEqual(['no-minimum-in-frame']);
  });

  it('is told so at intake by the same rule', () => {
    expect(inspectPicture(flatPicture(4095), setup).unusable).toEqual(['all-saturated']);
    expect(inspectPicture(flatPicture(1800, 30), setup).unusable).toEqual(['no-contrast']);
  });
});

describe('the facts at intake', () => {
  it('give the centre within its uncertainty, and the saturated share', () => {
    const { picture, setup: its } = exposureOf({
      ...pinhole,
      exposure: 5,
      center: { x: 100.3, y: 111.8 },
    });
    const { facts, unusable } = inspectPicture(picture, its);
    expect(unusable).toEqual([]);
    expect(Math.hypot(facts.center!.x - 100.3, facts.center!.y - 111.8)).toBeLessThan(3 * facts.center!.u);
    const saturated = picture.codes.filter((code) => code === picture.fullScale).length;
    expect(facts.saturatedShare).toBeCloseTo(saturated / picture.codes.length, 3);
    expect(facts.maskedShare).toBeGreaterThanOrEqual(facts.saturatedShare);
  });
});
