import { beamLitIntensity } from '#shared/apertures/beam-lit.ts';
import { defineFamily } from '#shared/apertures/family.ts';
import { boxRing } from '#shared/apertures/outlines.ts';
import { length, valueOf } from '#shared/apertures/parameters.ts';
import { sinc } from '#shared/physics/sinc.ts';

/** Slit along u whose length is not resolved: I = sinc²(w v) (Hecht 10.2.1) times the beam's own spot along u. */
export const slit = defineFamily({
  id: 'slit',
  label: 'Slit',
  parameters: [length('width', 'Width')],
  rotationPeriod: Math.PI,
  axis: 'long axis',
  complexity: 1,
  models: [
    {
      id: 'beam-lit',
      keys: ['width', 'beamExtent'],
      intensity(values, u, v, out, n) {
        const w = values[0];
        const d = values[1];
        for (let i = 0; i < n; i++) {
          const f = sinc(w * v[i]);
          out[i] = f * f * beamLitIntensity(d, u[i]);
        }
      },
      toFamily: (values) => ({ width: values[0] }),
      fromFamily: (values) => [valueOf(values, 'width'), 40 * valueOf(values, 'width')],
    },
  ],
  area: () => null,
  distance: (values, _x, y) => Math.abs(y) - valueOf(values, 'width') / 2,
  outline: (values, extent) => [boxRing(extent, valueOf(values, 'width'))],
  extent: (values) => valueOf(values, 'width'),
  proper: () => true,
  unitShapes: [1.3, 2, 3, 4.5, 7, 11, 18, 30].map((ratio) => ({ model: 'beam-lit', values: [1, ratio] })),
  kin: [
    {
      family: 'doubleSlit',
      model: 'beam-lit',
      start: (values) => ({
        values: [valueOf(values, 'width') / 2, valueOf(values, 'width') * 1.1, 40 * valueOf(values, 'width')],
        turn: 0,
      }),
    },
  ],
  examples: [{ width: 40e-6 }, { width: 80e-6 }, { width: 160e-6 }],
});
