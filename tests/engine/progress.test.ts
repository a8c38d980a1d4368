import { describe, expect, it } from 'vitest';
import { identify, Stopped } from '#server/engine/identify.ts';
import { exposureOf } from '#tests/engine/exposure.ts';

const { picture, setup } = exposureOf({ family: 'square', values: { side: 150e-6 }, orientation: 0.3 });

describe('progress of an identification', () => {
  it('never falls, names each step and ends at one', () => {
    const told: { step: string; share: number }[] = [];
    identify(picture, setup, { onProgress: (step, share) => told.push({ step, share }) });
    expect(told.length).toBeGreaterThan(10);
    told.forEach(({ share }, i) => expect(share).toBeGreaterThanOrEqual(i === 0 ? 0 : told[i - 1].share));
    expect(told.at(-1)!.share).toBe(1);
    expect(told.map((t) => t.step)).toContain('Comparing with square');
    for (const { step } of told) expect(step).toMatch(/^[A-Z][a-zé ,]+$/);
  });

  it('ends with Stopped at the next step once it is asked to stop', () => {
    let asked = 0;
    const steps: string[] = [];
    const run = () =>
      identify(picture, setup, { shouldStop: () => ++asked > 4, onProgress: (step) => steps.push(step) });
    expect(run).toThrow(Stopped);
    expect(steps).toHaveLength(4);
  });
});
