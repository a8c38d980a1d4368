import { defineFamily } from '#shared/apertures/family.ts';
import { boxDistance, boxRing } from '#shared/apertures/outlines.ts';
import { length, valueOf } from '#shared/apertures/parameters.ts';
import { sinc } from '#shared/physics/sinc.ts';

/** Rectangular opening, length along u: I = sinc²(l u) sinc²(w v); the fringes are closest along the long side (Hecht 10.2.4). */
export const rectangle = defineFamily({
  id: 'rectangle',
  label: 'Rectangle',
  parameters: [length('length', 'Length'), length('width', 'Width')],
  rotationPeriod: Math.PI,
  axis: 'long axis',
  longAxisFirst: true,
  complexity: 2,
  models: [
    {
      id: 'box',
      keys: ['length', 'width'],
      intensity(values, u, v, out, n) {
        const l = values[0];
        const w = values[1];
        for (let i = 0; i < n; i++) {
          const f = sinc(l * u[i]) * sinc(w * v[i]);
          out[i] = f * f;
        }
      },
      toFamily: (values) => ({ length: values[0], width: values[1] }),
      fromFamily: (values) => [valueOf(values, 'length'), valueOf(values, 'width')],
    },
  ],
  area: (values) => valueOf(values, 'length') * valueOf(values, 'width'),
  distance: (values, x, y) => boxDistance(x, y, valueOf(values, 'length'), valueOf(values, 'width')),
  outline: (values) => [boxRing(valueOf(values, 'length'), valueOf(values, 'width'))],
  extent: (values) => Math.hypot(valueOf(values, 'length'), valueOf(values, 'width')),
  proper: (values) => valueOf(values, 'length') / valueOf(values, 'width') >= 1.01,
  unitShapes: [1.06, 1.15, 1.3, 1.5, 1.75, 2, 2.4, 3, 3.7, 4.5, 5.5, 7, 9, 12].map((aspect) => ({
    model: 'box',
    values: [Math.sqrt(aspect), 1 / Math.sqrt(aspect)],
  })),
  kin: [
    {
      family: 'square',
      model: 'box',
      start: (values) => ({
        values: [Math.sqrt(valueOf(values, 'length') * valueOf(values, 'width'))],
        turn: 0,
      }),
    },
    {
      family: 'slot',
      model: 'obround',
      start: (values) => ({
        values: [valueOf(values, 'length') + 0.1 * valueOf(values, 'width'), valueOf(values, 'width') * 1.05],
        turn: 0,
      }),
    },
    {
      family: 'ellipse',
      model: 'disc',
      start: (values) => ({
        values: [valueOf(values, 'length') * 1.13, valueOf(values, 'width') * 1.13],
        turn: 0,
      }),
    },
    {
      family: 'slit',
      model: 'beam-lit',
      start: (values) => ({ values: [valueOf(values, 'width'), valueOf(values, 'length') * 1.2], turn: 0 }),
    },
  ],
  examples: [
    { length: 150e-6, width: 60e-6 },
    { length: 200e-6, width: 150e-6 },
    { length: 400e-6, width: 80e-6 },
  ],
});
