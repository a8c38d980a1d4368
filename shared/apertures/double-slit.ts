import { beamLitIntensity } from '#shared/apertures/beam-lit.ts';
import { defineFamily } from '#shared/apertures/family.ts';
import { boxDistance, boxRing } from '#shared/apertures/outlines.ts';
import { length, valueOf } from '#shared/apertures/parameters.ts';
import { cosPi, sinc } from '#shared/physics/sinc.ts';

/** Two equal slits along u: I = sinc²(a v) cos²(π d v) (Hecht 10.2.2) times sinc²(l u), or the beam's own spot along u. */
export const doubleSlit = defineFamily({
  id: 'doubleSlit',
  label: 'Double slit',
  parameters: [
    length('slitWidth', 'Slit width'),
    length('separation', 'Separation, centre to centre'),
    length('slitLength', 'Slit length', { nullable: true }),
  ],
  rotationPeriod: Math.PI,
  axis: 'long axis of the slits',
  complexity: 3,
  models: [
    {
      id: 'finite',
      keys: ['slitWidth', 'separation', 'slitLength'],
      intensity(values, u, v, out, n) {
        const a = values[0];
        const d = values[1];
        const l = values[2];
        for (let i = 0; i < n; i++) {
          const f = sinc(a * v[i]) * cosPi(d * v[i]) * sinc(l * u[i]);
          out[i] = f * f;
        }
      },
      toFamily: (values) => ({ slitWidth: values[0], separation: values[1], slitLength: values[2] }),
      fromFamily: (values) => [
        valueOf(values, 'slitWidth'),
        valueOf(values, 'separation'),
        values['slitLength'] ?? 10 * valueOf(values, 'separation'),
      ],
    },
    {
      id: 'beam-lit',
      keys: ['slitWidth', 'separation', 'beamExtent'],
      intensity(values, u, v, out, n) {
        const a = values[0];
        const d = values[1];
        const extent = values[2];
        for (let i = 0; i < n; i++) {
          const f = sinc(a * v[i]) * cosPi(d * v[i]);
          out[i] = f * f * beamLitIntensity(extent, u[i]);
        }
      },
      toFamily: (values) => ({ slitWidth: values[0], separation: values[1], slitLength: null }),
      fromFamily: (values) => [
        valueOf(values, 'slitWidth'),
        valueOf(values, 'separation'),
        10 * valueOf(values, 'separation'),
      ],
    },
  ],
  area(values) {
    const l = values['slitLength'];
    return l === null || l === undefined ? null : 2 * l * valueOf(values, 'slitWidth');
  },
  distance(values, x, y) {
    const a = valueOf(values, 'slitWidth');
    const l = values['slitLength'];
    const across = Math.abs(y) - valueOf(values, 'separation') / 2;
    return l === null || l === undefined ? Math.abs(across) - a / 2 : boxDistance(x, across, l, a);
  },
  outline(values, extent) {
    const l = values['slitLength'] ?? extent;
    const a = valueOf(values, 'slitWidth');
    const half = valueOf(values, 'separation') / 2;
    return [boxRing(l, a, 0, -half), boxRing(l, a, 0, half)];
  },
  extent(values) {
    const across = valueOf(values, 'separation') + valueOf(values, 'slitWidth');
    return Math.hypot(across, values['slitLength'] ?? 0);
  },
  proper: (values) => valueOf(values, 'separation') / valueOf(values, 'slitWidth') >= 1.15,
  unitShapes: [1.3, 1.6, 2, 2.5, 3, 4, 5, 6.5].flatMap((ratio) => [
    ...[0.5, 0.9, 1.5, 2.5, 4, 7].map((l) => ({
      model: 'finite',
      values: [1 / (1 + ratio), ratio / (1 + ratio), l],
    })),
    ...[1.5, 3, 6, 12].map((l) => ({ model: 'beam-lit', values: [1 / (1 + ratio), ratio / (1 + ratio), l] })),
  ]),
  kin: [
    {
      family: 'slit',
      model: 'beam-lit',
      start: (values) => ({
        values: [
          valueOf(values, 'separation') + valueOf(values, 'slitWidth'),
          values['slitLength'] ?? 10 * valueOf(values, 'separation'),
        ],
        turn: 0,
      }),
    },
    {
      family: 'rectangle',
      model: 'box',
      start(values) {
        const across = valueOf(values, 'separation') + valueOf(values, 'slitWidth');
        const l = values['slitLength'];
        if (l === null || l === undefined) return null;
        return l >= across ? { values: [l, across], turn: 0 } : { values: [across, l], turn: Math.PI / 2 };
      },
    },
  ],
  examples: [
    { slitWidth: 30e-6, separation: 98e-6, slitLength: 360e-6 },
    { slitWidth: 20e-6, separation: 60e-6, slitLength: 200e-6 },
    { slitWidth: 40e-6, separation: 160e-6, slitLength: null },
  ],
});
