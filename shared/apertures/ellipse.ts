import { defineFamily } from '#shared/apertures/family.ts';
import { ellipseRing } from '#shared/apertures/outlines.ts';
import { length, valueOf } from '#shared/apertures/parameters.ts';
import { jinc } from '#shared/physics/jinc.ts';

/** Elliptic opening, major axis along u: the pinhole's pattern with each axis stretched by its own size (Born & Wolf 8.5.2). */
export const ellipse = defineFamily({
  id: 'ellipse',
  label: 'Ellipse',
  parameters: [length('major', 'Major axis'), length('minor', 'Minor axis')],
  rotationPeriod: Math.PI,
  axis: 'major axis',
  longAxisFirst: true,
  complexity: 2,
  models: [
    {
      id: 'disc',
      keys: ['major', 'minor'],
      intensity(values, u, v, out, n) {
        const a = Math.PI * values[0];
        const b = Math.PI * values[1];
        for (let i = 0; i < n; i++) {
          const x = a * u[i];
          const y = b * v[i];
          const f = jinc(Math.sqrt(x * x + y * y));
          out[i] = f * f;
        }
      },
      toFamily: (values) => ({ major: values[0], minor: values[1] }),
      fromFamily: (values) => [valueOf(values, 'major'), valueOf(values, 'minor')],
    },
  ],
  area: (values) => (Math.PI / 4) * valueOf(values, 'major') * valueOf(values, 'minor'),
  distance(values, x, y) {
    const a = valueOf(values, 'major') / 2;
    const b = valueOf(values, 'minor') / 2;
    // Sampson's distance: exact at the edge to second order, and of the right sign everywhere.
    const level = Math.hypot(x / a, y / b);
    const slope = Math.hypot(x / (a * a), y / (b * b));
    return slope === 0 ? -Math.min(a, b) : (level * (level - 1)) / slope;
  },
  outline: (values) => [ellipseRing(valueOf(values, 'major'), valueOf(values, 'minor'))],
  extent: (values) => valueOf(values, 'major'),
  proper: (values) => valueOf(values, 'major') / valueOf(values, 'minor') >= 1.01,
  unitShapes: [1.05, 1.12, 1.2, 1.35, 1.5, 1.75, 2, 2.5, 3.2, 4].map((aspect) => ({
    model: 'disc',
    values: [Math.sqrt(aspect), 1 / Math.sqrt(aspect)],
  })),
  kin: [
    {
      family: 'pinhole',
      model: 'disc',
      start: (values) => ({
        values: [Math.sqrt(valueOf(values, 'major') * valueOf(values, 'minor'))],
        turn: 0,
      }),
    },
    {
      family: 'slot',
      model: 'obround',
      start: (values) => ({
        values: [valueOf(values, 'major') * 0.95, valueOf(values, 'minor') * 0.9],
        turn: 0,
      }),
    },
    {
      family: 'rectangle',
      model: 'box',
      start: (values) => ({
        values: [valueOf(values, 'major') * 0.88, valueOf(values, 'minor') * 0.88],
        turn: 0,
      }),
    },
  ],
  examples: [
    { major: 90e-6, minor: 60e-6 },
    { major: 180e-6, minor: 100e-6 },
    { major: 250e-6, minor: 200e-6 },
  ],
});
