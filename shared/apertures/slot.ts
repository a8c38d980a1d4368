import { defineFamily } from '#shared/apertures/family.ts';
import { obroundRing } from '#shared/apertures/outlines.ts';
import { length, valueOf } from '#shared/apertures/parameters.ts';
import { jinc } from '#shared/physics/jinc.ts';
import { obroundMiddle } from '#shared/physics/obround.ts';
import { cosPi, sinc } from '#shared/physics/sinc.ts';

/**
 * Obround, length along u: with cap radius r = w/2 and half straight length c = (l − w)/2 the amplitude is
 * 2rc sinc(2uc) C(2πur, 2πvr) + πr² cos(2πuc) 2J1(x)/x, x = 2πr√(u² + v²), over the area. From integrating the opening's
 * chords parallel to u; C is `obroundMiddle`.
 */
export const slot = defineFamily({
  id: 'slot',
  label: 'Slot',
  parameters: [length('length', 'Overall length'), length('width', 'Width')],
  rotationPeriod: Math.PI,
  axis: 'long axis',
  complexity: 2,
  models: [
    {
      id: 'obround',
      keys: ['length', 'width'],
      intensity(values, u, v, out, n) {
        const r = values[1] / 2;
        const c = Math.max(values[0] - values[1], 0) / 2;
        const caps = Math.PI * r * r;
        const area = 4 * c * r + caps;
        const straight = (2 * r * c) / area;
        const round = caps / area;
        for (let i = 0; i < n; i++) {
          const a = 2 * Math.PI * u[i] * r;
          const b = 2 * Math.PI * v[i] * r;
          const f =
            straight * sinc(2 * u[i] * c) * obroundMiddle(a, b) +
            round * cosPi(2 * u[i] * c) * jinc(Math.sqrt(a * a + b * b));
          out[i] = f * f;
        }
      },
      toFamily: (values) => ({ length: values[0], width: values[1] }),
      fromFamily: (values) => [valueOf(values, 'length'), valueOf(values, 'width')],
    },
  ],
  area(values) {
    const w = valueOf(values, 'width');
    return (valueOf(values, 'length') - w) * w + (Math.PI / 4) * w * w;
  },
  distance(values, x, y) {
    const r = valueOf(values, 'width') / 2;
    const c = valueOf(values, 'length') / 2 - r;
    return Math.hypot(Math.max(Math.abs(x) - c, 0), y) - r;
  },
  outline: (values) => [obroundRing(valueOf(values, 'length'), valueOf(values, 'width'))],
  extent: (values) => valueOf(values, 'length'),
  proper: (values) => valueOf(values, 'length') / valueOf(values, 'width') >= 1.04,
  unitShapes: [1.15, 1.3, 1.5, 1.75, 2, 2.4, 3, 3.7, 4.5, 6, 8].map((aspect) => ({
    model: 'obround',
    values: [Math.sqrt(aspect), 1 / Math.sqrt(aspect)],
  })),
  kin: [
    {
      family: 'pinhole',
      model: 'disc',
      start: (values) => ({
        values: [Math.sqrt(valueOf(values, 'length') * valueOf(values, 'width'))],
        turn: 0,
      }),
    },
    {
      family: 'ellipse',
      model: 'disc',
      start: (values) => ({
        values: [valueOf(values, 'length') * 1.06, valueOf(values, 'width') * 1.1],
        turn: 0,
      }),
    },
    {
      family: 'rectangle',
      model: 'box',
      start: (values) => ({
        values: [valueOf(values, 'length') - 0.1 * valueOf(values, 'width'), valueOf(values, 'width') * 0.95],
        turn: 0,
      }),
    },
  ],
  examples: [
    { length: 150e-6, width: 60e-6 },
    { length: 200e-6, width: 120e-6 },
    { length: 320e-6, width: 80e-6 },
  ],
});
