import type { FarFieldModel } from '#shared/apertures/family.ts';
import { jinc } from '#shared/physics/jinc.ts';

/**
 * Two round holes of unequal size, one beyond the other along u: an opening that no family of the catalogue holds. The
 * amplitudes of the two discs (Born & Wolf 8.5.2) add with the phase of their distance.
 */
export const unequalHoles: FarFieldModel = {
  id: 'unequal-holes',
  keys: ['largeDiameter', 'smallDiameter', 'separation'],
  intensity(values, u, v, out, n) {
    const [large, small, separation] = Array.from(values);
    const shares = [large * large, small * small].map((a) => a / (large * large + small * small));
    for (let i = 0; i < n; i++) {
      const q = Math.PI * Math.hypot(u[i], v[i]);
      const a = shares[0] * jinc(q * large);
      const b = shares[1] * jinc(q * small);
      out[i] = a * a + b * b + 2 * a * b * Math.cos(2 * Math.PI * separation * u[i]);
    }
  },
  toFamily: () => ({}),
  fromFamily: () => [],
};
