import { defineFamily } from '#shared/apertures/family.ts';
import { boxDistance, boxRing } from '#shared/apertures/outlines.ts';
import { length, valueOf } from '#shared/apertures/parameters.ts';
import { sinc } from '#shared/physics/sinc.ts';

/** Square opening, sides along u and v: I = sinc²(s u) sinc²(s v) (Hecht, Optics, 10.2.4). */
export const square = defineFamily({
  id: 'square',
  label: 'Square',
  parameters: [length('side', 'Side')],
  rotationPeriod: Math.PI / 2,
  axis: 'side',
  complexity: 1,
  models: [
    {
      id: 'box',
      keys: ['side'],
      intensity(values, u, v, out, n) {
        const s = values[0];
        for (let i = 0; i < n; i++) {
          const f = sinc(s * u[i]) * sinc(s * v[i]);
          out[i] = f * f;
        }
      },
      toFamily: (values) => ({ side: values[0] }),
      fromFamily: (values) => [valueOf(values, 'side')],
    },
  ],
  area: (values) => valueOf(values, 'side') ** 2,
  distance: (values, x, y) => boxDistance(x, y, valueOf(values, 'side'), valueOf(values, 'side')),
  outline: (values) => [boxRing(valueOf(values, 'side'), valueOf(values, 'side'))],
  extent: (values) => valueOf(values, 'side') * Math.SQRT2,
  proper: () => true,
  unitShapes: [{ model: 'box', values: [1] }],
  kin: [
    {
      family: 'rectangle',
      model: 'box',
      start: (values) => ({
        values: [valueOf(values, 'side') * 1.02, valueOf(values, 'side') * 0.98],
        turn: 0,
      }),
    },
  ],
  examples: [{ side: 60e-6 }, { side: 150e-6 }, { side: 260e-6 }],
});
