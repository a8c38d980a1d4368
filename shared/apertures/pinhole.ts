import { defineFamily } from '#shared/apertures/family.ts';
import { ellipseRing } from '#shared/apertures/outlines.ts';
import { length, valueOf } from '#shared/apertures/parameters.ts';
import { jinc } from '#shared/physics/jinc.ts';

/** Round opening: I = [2J1(x)/x]², x = πD sin θ/λ (Born & Wolf 8.5.2). */
export const pinhole = defineFamily({
  id: 'pinhole',
  label: 'Pinhole',
  parameters: [length('diameter', 'Diameter')],
  rotationPeriod: null,
  axis: null,
  complexity: 1,
  models: [
    {
      id: 'disc',
      keys: ['diameter'],
      intensity(values, u, v, out, n) {
        const k = Math.PI * values[0];
        for (let i = 0; i < n; i++) {
          const f = jinc(k * Math.sqrt(u[i] * u[i] + v[i] * v[i]));
          out[i] = f * f;
        }
      },
      toFamily: (values) => ({ diameter: values[0] }),
      fromFamily: (values) => [valueOf(values, 'diameter')],
    },
  ],
  area: (values) => (Math.PI / 4) * valueOf(values, 'diameter') ** 2,
  distance: (values, x, y) => Math.hypot(x, y) - valueOf(values, 'diameter') / 2,
  outline: (values) => [ellipseRing(valueOf(values, 'diameter'), valueOf(values, 'diameter'))],
  extent: (values) => valueOf(values, 'diameter'),
  proper: () => true,
  unitShapes: [{ model: 'disc', values: [1] }],
  kin: [
    {
      family: 'ellipse',
      model: 'disc',
      start: (values) => ({
        values: [valueOf(values, 'diameter') * 1.02, valueOf(values, 'diameter') * 0.98],
        turn: 0,
      }),
    },
  ],
  examples: [{ diameter: 50e-6 }, { diameter: 120e-6 }, { diameter: 300e-6 }],
});
