import { describe, expect, it } from 'vitest';
import type { ApertureValues } from '#shared/apertures/family.ts';
import { familyOf } from '#shared/apertures/registry.ts';
import { besselJ0, besselJ1 } from '#shared/physics/bessel.ts';
import { spatialFrequency, type Geometry } from '#shared/physics/geometry.ts';

/** Intensity of a family's first model (or the named one) at one spatial frequency. */
function intensity(id: string, values: ApertureValues, u: number, v: number, model?: string): number {
  const family = familyOf(id);
  const form = family.models.find((m) => m.id === model) ?? family.models[0];
  const out = new Float64Array(1);
  form.intensity(form.fromFamily(values), Float64Array.of(u), Float64Array.of(v), out, 1);
  return out[0];
}

/** Where f is least between a and b (golden section). */
function lowest(f: (x: number) => number, from: number, to: number): number {
  const g = (Math.sqrt(5) - 1) / 2;
  let [a, b] = [from, to];
  for (let k = 0; k < 80; k++) {
    const x = b - g * (b - a);
    const y = a + g * (b - a);
    if (f(x) < f(y)) b = y;
    else a = x;
  }
  return (a + b) / 2;
}

describe('the pinhole', () => {
  // Born & Wolf, Principles of Optics, Table 8.2; zeros from Abramowitz & Stegun, Table 9.5.
  const rings = [
    [1.2196698913, 1.6347193504, 0.017497863, 0.837784869],
    [2.2331305944, 2.6792920243, 0.004157996, 0.909930535],
    [3.2383154842, 3.698710321, 0.001600638, 0.937647474],
    [4.2410628638, 4.7096977278, 0.000779445, 0.952319169],
    [5.2427643769, 5.7167880993, 0.000437026, 0.961401358],
    [6.2439216899, 6.7217489285, 0.000269287, 0.967577181],
  ];
  const diameter = 100e-6;
  const at = (x: number) => intensity('pinhole', { diameter }, (0.6 * x) / diameter, (0.8 * x) / diameter);

  it('has its dark rings at the zeros of J1 and its bright ones as high as tabulated', () => {
    for (const [dark, bright, height] of rings) {
      expect(at(dark)).toBeLessThan(1e-16);
      expect(Math.abs(at(bright) - height)).toBeLessThan(1e-9);
      expect(Math.abs(lowest((x) => -at(x), bright - 0.2, bright + 0.2) - bright)).toBeLessThan(1e-4);
    }
    // The On-Line Encyclopedia of Integer Sequences, A221210: half maximum at x = 1.6163399483.
    expect(at(1.6163399483 / Math.PI)).toBeCloseTo(0.5, 8);
  });

  it('holds the tabulated share of its light within each dark ring', () => {
    for (const [dark, , , share] of rings) {
      // Midpoint sum of 2π r I dr; all the light is 4/(π D²) in these units, Rayleigh 1 − J0² − J1² as second source.
      const n = 4000;
      let sum = 0;
      for (let k = 0; k < n; k++)
        sum += at((dark * (k + 0.5)) / n) * 2 * Math.PI * ((dark * (k + 0.5)) / n) * (dark / n);
      expect(Math.abs((sum * Math.PI) / 4 - share)).toBeLessThan(1e-6);
      expect(
        Math.abs(1 - besselJ0(Math.PI * dark) ** 2 - besselJ1(Math.PI * dark) ** 2 - share),
      ).toBeLessThan(1e-9);
    }
  });
});

describe('the slit', () => {
  // Hecht, Optics, 10.2.1; maxima at tan β = β of height 1/(1 + β²).
  const width = 80e-6;
  const at = (x: number) => intensity('slit', { width }, 0, x / width);

  it('is dark exactly where w sin θ = mλ', () => {
    for (let m = 1; m <= 5; m++) expect(at(m)).toBeLessThan(1e-28);
  });

  it('has secondary maxima where tan β = β, as high as tabulated', () => {
    for (const [place, height] of [
      [1.4302966531, 0.047190449],
      [2.459024033, 0.016480026],
      [3.4708897243, 0.008340293],
      [4.4774085834, 0.005028719],
      [5.4815366506, 0.00336073],
    ]) {
      expect(Math.abs(at(place) - height)).toBeLessThan(6e-10);
      expect(Math.abs(lowest((x) => -at(x), place - 0.3, place + 0.3) - place)).toBeLessThan(1e-6);
    }
    expect(at(1.3915573783 / Math.PI)).toBeCloseTo(0.5, 9);
  });

  it('shows its first dark fringe at sin θ = λ/w on a flat sensor, not at tan θ', () => {
    const bench: Geometry = { kind: 'screen', wavelength: 632.8e-9, distance: 0.2, pixelPitch: 5e-6 };
    const narrow = 3e-6;
    const sine = bench.wavelength / narrow;
    const pixels = (bench.distance * Math.tan(Math.asin(sine))) / bench.pixelPitch;
    const { fx } = spatialFrequency(bench, pixels, 0);
    expect(intensity('slit', { width: narrow }, 0, fx)).toBeLessThan(1e-25);
    const { fx: paraxial } = spatialFrequency(bench, (bench.distance * sine) / bench.pixelPitch, 0);
    expect(intensity('slit', { width: narrow }, 0, paraxial)).toBeGreaterThan(1e-5);
  });

  it('spreads along u only as far as the beam itself does', () => {
    const form = familyOf('slit').models[0];
    const out = new Float64Array(1);
    // Bracewell: a Gaussian of 1/e² diameter d has the far-field intensity exp(−(πdu)²/2); 1/e² at u = 2/(πd).
    form.intensity([width, 1e-3], Float64Array.of(2 / (Math.PI * 1e-3)), Float64Array.of(0), out, 1);
    expect(out[0]).toBeCloseTo(Math.exp(-2), 12);
  });
});

describe('the double slit', () => {
  // Hecht, Optics, 10.2.2: order m has the height sinc²(m a/d); orders with m a/d whole are missing.
  const heights: Record<number, number[]> = {
    2: [1, 0.40528473, 0, 0.04503164, 0, 0.01621139, 0, 0.00827112],
    3: [1, 0.68391799, 0.1709795, 0, 0.04274487, 0.02735672, 0, 0.01395751],
    4: [1, 0.81056947, 0.40528473, 0.09006327, 0, 0.03242278, 0.04503164, 0.01654223],
    5: [1, 0.8751402, 0.5727867, 0.25457187, 0.05469626, 0],
  };

  it.each(Object.keys(heights).map(Number))(
    'has the order heights and missing orders of d/a = %d',
    (ratio) => {
      const values = { slitWidth: 20e-6, separation: ratio * 20e-6, slitLength: 400e-6 };
      for (const model of ['finite', 'beam-lit'])
        heights[ratio].forEach((height, m) => {
          const here = intensity('doubleSlit', values, 0, m / values.separation, model);
          expect(Math.abs(here - height)).toBeLessThan(6e-9);
        });
    },
  );

  it('has fringes λL/d apart, dark halfway between', () => {
    const bench: Geometry = { kind: 'lens', wavelength: 632.8e-9, distance: 0.2, pixelPitch: 5e-6 };
    const values = { slitWidth: 10e-6, separation: 100e-6, slitLength: null };
    const spacing = (bench.wavelength * bench.distance) / values.separation / bench.pixelPitch;
    for (let m = 0; m < 4; m++) {
      const { fx } = spatialFrequency(bench, (m + 0.5) * spacing, 0);
      expect(intensity('doubleSlit', values, 0, fx, 'beam-lit')).toBeLessThan(1e-24);
    }
  });
});

describe('square and rectangle', () => {
  it('a square has sinc⁴ along its diagonal, dark first at √2 cycles per side', () => {
    // Values at (0.5, 0), (1.5, 0) and (0.7, 0.4) from an edge-integral computed apart from this code.
    const at = (u: number, v: number) => intensity('square', { side: 1 }, u, v);
    expect(at(0.5, 0)).toBeCloseTo(0.405284735, 9);
    expect(at(1.5, 0)).toBeCloseTo(0.045031637, 9);
    expect(at(0.7, 0.4)).toBeCloseTo(0.077519754, 9);
    expect(at(1, 1)).toBeLessThan(1e-28);
    const f = 0.3;
    expect(at(f, f)).toBeCloseTo((Math.sin(Math.PI * f) / (Math.PI * f)) ** 4, 12);
  });

  it('a rectangle has its closest fringes along its long side', () => {
    const values = { length: 200e-6, width: 50e-6 };
    // Hecht, Optics, 10.2.4: dark at 1/length along the length, at 1/width across.
    expect(intensity('rectangle', values, 1 / 200e-6, 0)).toBeLessThan(1e-28);
    expect(intensity('rectangle', values, 0, 1 / 200e-6)).toBeGreaterThan(0.8);
    expect(intensity('rectangle', values, 0, 1 / 50e-6)).toBeLessThan(1e-28);
  });
});

describe('the ellipse', () => {
  it('is the pinhole’s pattern with the width 2√(a²cos²β + b²sin²β) at each azimuth, long where the opening is short', () => {
    // Born & Wolf, Principles of Optics, 8.5.2, by stretching one axis.
    const [major, minor] = [180e-6, 100e-6];
    for (let k = 0; k < 12; k++) {
      const beta = (k * Math.PI) / 12;
      const diameter = Math.hypot(major * Math.cos(beta), minor * Math.sin(beta));
      const f = 1.2196698913 / diameter;
      expect(intensity('ellipse', { major, minor }, f * Math.cos(beta), f * Math.sin(beta))).toBeLessThan(
        1e-15,
      );
    }
  });
});

describe('the slot', () => {
  // Values for width 1 and length 3, computed apart from this code by quadrature over the opening.
  const values = { length: 3, width: 1 };
  const at = (u: number, v: number) => intensity('slot', values, u, v);

  it('has the published intensities', () => {
    for (const [u, v, value] of [
      [0.2, 0, 0.309889752],
      [0.4, 0, 0.009511449],
      [0, 1, 0.00261025],
      [0.3, 0.6, 0.004480689],
    ])
      // The amplitude is good to a millionth; the intensity to twice that times the amplitude.
      expect(Math.abs(at(u, v) - value)).toBeLessThan(2e-6 * Math.sqrt(value) + 1e-9);
    expect(familyOf('slot').area(values)).toBeCloseTo(2.7853981634, 10);
  });

  it('is dark first at 0.35866 along and 1.05420 across, so that a rectangle fitted to it reads 7 % short', () => {
    const along = lowest((x) => at(x, 0), 0.3, 0.42);
    const across = lowest((x) => at(0, x), 0.9, 1.2);
    expect(Math.abs(along - 0.3586628946)).toBeLessThan(2e-6);
    expect(Math.abs(across - 1.0542047832)).toBeLessThan(2e-5);
    expect(1 - 1 / along / 3).toBeCloseTo(0.0706, 3);
  });

  it('becomes the pinhole when its length is its width', () => {
    for (const f of [0.3, 1.1, 2.7, 9])
      expect(
        Math.abs(
          intensity('slot', { length: 1, width: 1 }, 0.6 * f, 0.8 * f) -
            intensity('pinhole', { diameter: 1 }, f, 0),
        ),
      ).toBeLessThan(1e-12);
  });
});
