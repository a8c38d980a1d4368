// @vitest-environment jsdom
import { render } from '@testing-library/react';
import { describe, expect, it } from 'vitest';
import type { Candidate, Outcome } from '#shared/contracts/identifications.ts';
import { AnswerHeadline } from '#src/features/identifications/headline.tsx';
import {
  farFieldSentence,
  specimenOrientation,
  untoldClause,
  verdictSentence,
} from '#src/features/identifications/outcome-words.ts';

type Answer = Extract<Outcome, { kind: 'answer' }>;
type Dimension = Candidate['dimensions'][string];

const size = (um: number, u: number, bound: Dimension['bound'] = null): Dimension => ({
  value: um * 1e-6,
  uImage: 0,
  uSetup: u * 1e-6,
  u: u * 1e-6,
  bound,
});

function candidate(
  family: string,
  dimensions: Candidate['dimensions'],
  more: Partial<Candidate> = {},
): Candidate {
  return {
    family,
    model: 'any',
    values: Object.fromEntries(Object.entries(dimensions).map(([key, d]) => [key, d.value])),
    dimensions,
    orientation: { value: (27.3 * Math.PI) / 180, u: (0.05 * Math.PI) / 180 },
    orientationPeriod: Math.PI,
    probability: 0.99,
    reducedChiSquare: 1,
    fit: {
      values: [],
      center: { x: 0, y: 0 },
      amplitude: 1,
      background: { offset: 0, slopeX: 0, slopeY: 0 },
      blurVariance: 0,
    },
    ...more,
  };
}

function answer(verdict: Answer['verdict'], candidates: Candidate[]): Answer {
  return {
    kind: 'answer',
    verdict,
    candidates,
    untold: ['half-turn-twin'],
    farField: { holds: true, fresnelNumber: 0.05, distanceNeeded: 0.1 },
    picture: { saturatedShare: 0, maskedShare: 0, center: null, noise: null },
  };
}

const slot = candidate('slot', { length: size(212.4321, 0.35), width: size(84.1111, 0.15) });
const rectangle = candidate(
  'rectangle',
  { length: size(200, 0.4), width: size(81, 0.2) },
  { probability: 0.4 },
);

const text = (a: Answer) =>
  render(<AnswerHeadline answer={a} />).container.textContent?.replaceAll('\u00a0', ' ');

describe('the headline', () => {
  it('prints sizes to two figures of U = 2u and the direction of the axis', () => {
    expect(text(answer('identified', [slot]))).toBe(
      'Slot, 212.43 ± 0.70 by 84.11 ± 0.30 µm, long axis at 27.30° ± 0.10°',
    );
  });

  it('says bounds and unresolved lengths in words', () => {
    const bounded = candidate('rectangle', { length: size(300, 1), width: size(12, 1, 'at-most') });
    expect(text(answer('identified', [bounded]))).toContain('at most 12 µm');
    const slits = candidate('doubleSlit', {
      slitWidth: size(40, 0.1),
      separation: size(160, 0.2),
      slitLength: { value: null, uImage: 0, uSetup: 0, u: 0, bound: null },
    });
    expect(text(answer('identified', [slits]))).toContain('length not resolved');
  });

  it('names the shapes that cannot be told apart, and none that does not fit', () => {
    expect(text(answer('ambiguous', [slot, rectangle]))).toBe(
      'Slot or Rectangle: this picture does not tell',
    );
    expect(text(answer('unidentified', [slot, rectangle]))).toBe('No shape of the catalogue fits');
  });
});

describe('the words of an outcome', () => {
  it('claim one shape, some shapes or none', () => {
    expect(verdictSentence(answer('identified', [slot]))).toBe('One shape of the catalogue fits: slot.');
    expect(verdictSentence(answer('ambiguous', [slot, rectangle]))).toBe(
      'This picture does not tell slot from rectangle.',
    );
    expect(verdictSentence(answer('unidentified', [slot, rectangle]))).toContain('neither is claimed');
  });

  it('say the half-turn twin, the complement and the bounded size', () => {
    expect(untoldClause('half-turn-twin', slot)).toContain('half turn');
    expect(untoldClause('complement', slot)).toContain('zero order');
    const bounded = candidate('rectangle', { length: size(300, 1), width: size(12, 1, 'at-most') });
    expect(untoldClause('bounded-dimension', bounded)).toContain('the width beyond a bound');
  });

  it('state the Fresnel number with its limit, and the distance that is needed', () => {
    expect(
      farFieldSentence({ holds: true, fresnelNumber: 0.0571, distanceNeeded: 0.2 }, { geometry: 'sensor' }),
    ).toBe('Far field holds: Fresnel number 0.057, limit 0.1.');
    expect(
      farFieldSentence({ holds: false, fresnelNumber: 0.31, distanceNeeded: 0.7712 }, { geometry: 'sensor' }),
    ).toContain('Move the camera to at least 771\u00a0mm.');
  });

  it("turn the specimen's own direction over where the camera sees the pattern reversed", () => {
    expect(specimenOrientation(slot, false)).toBeNull();
    expect((specimenOrientation(slot, true)! * 180) / Math.PI).toBeCloseTo(152.7, 9);
  });
});
