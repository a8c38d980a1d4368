import { describe, expect, it } from 'vitest';
import { profileAlong } from '#src/features/identifications/profile.ts';
import { linearCounts } from '#src/ui/pattern/counts.ts';
import { scaleBar } from '#src/ui/pattern/overlay.ts';
import { level, paintPlane, toneOf } from '#src/ui/pattern/tone.ts';
import { fittingView, panBy, toFrame, toPicture, zoomAbout } from '#src/ui/pattern/view.ts';
import type { BenchCopy } from '#shared/contracts/benches.ts';

const bench: BenchCopy = {
  benchId: '00000000-0000-4000-8000-000000000001',
  name: 'bench',
  version: 1,
  geometry: 'lens',
  wavelength: { value: 500e-9, u: 0 },
  distance: { value: 0.1, u: 0 },
  pixelPitch: { value: 5e-6, u: 0 },
  encoding: 'linear',
  bitDepth: 12,
  darkLevel: 64,
  mirrored: false,
};

describe('counts of a picture', () => {
  it('keep all sixteen bits and lose the dark level', () => {
    const picture = { width: 3, height: 1, fullScale: 65520, codeStep: 16, lossy: false, bench };
    const { counts } = linearCounts(picture, Uint16Array.from([64 * 16, 65 * 16, 65520]));
    expect([...counts]).toEqual([0, 16, 65520 - 1024]);
  });

  it('are linear where the file is sRGB (IEC 61966-2-1: code 128 is 0.215861)', () => {
    const srgb = { ...bench, encoding: 'srgb' as const, bitDepth: 8 as const, darkLevel: null };
    const picture = { width: 1, height: 1, fullScale: 255, codeStep: 1, lossy: false, bench: srgb };
    expect(linearCounts(picture, Uint16Array.from([128])).counts[0] / 255).toBeCloseTo(0.2158605, 6);
  });
});

describe('the tone', () => {
  const counts = Float32Array.from([10, 11, 110, 1010]);

  it('runs from black to the peak without ever falling, on every scale', () => {
    for (const scale of ['log', 'root', 'linear'] as const) {
      const tone = toneOf(counts, 10, 1, scale);
      expect(level(tone, 10)).toBe(0);
      expect(level(tone, 1010)).toBeCloseTo(255, 9);
      for (let c = 0; c < 1200; c++) expect(level(tone, c + 1)).toBeGreaterThanOrEqual(level(tone, c));
    }
  });

  it('gives equal ratios equal steps well above the noise on the logarithmic scale', () => {
    const tone = toneOf(Float32Array.from([0, 1e6]), 0, 1, 'log');
    // ln(1 + x) parts from ln x by less than 1/x: from a hundred times the floor on, a hundredth of a decade's step.
    const step = level(tone, 1e5) - level(tone, 1e4);
    expect(Math.abs(level(tone, 1e4) - level(tone, 1e3) - step) / step).toBeLessThan(0.01);
  });

  it('paints saturated pixels flat, whatever their counts', () => {
    const rgba = new Uint8ClampedArray(16);
    const map = new Uint8ClampedArray(768).fill(7);
    paintPlane(counts, toneOf(counts, 10, 1, 'log'), map, rgba, { at: (i) => i === 3, colour: [1, 2, 3] });
    expect([...rgba.slice(8)]).toEqual([7, 7, 7, 255, 1, 2, 3, 255]);
  });
});

describe('the view', () => {
  const picture = { width: 800, height: 600 };
  const frame = { width: 400, height: 300 };

  it('fits the whole picture and maps there and back', () => {
    const view = fittingView(picture, frame);
    expect(view.zoom).toBe(0.5);
    const at = toPicture(view, 120, 80, frame);
    expect(toFrame(view, at.x, at.y, frame)).toEqual({ x: 120, y: 80 });
  });

  it('keeps the point under the pointer while zooming', () => {
    const view = fittingView(picture, frame);
    const before = toPicture(view, 90, 210, frame);
    const after = toPicture(zoomAbout(view, 3, 90, 210, picture, frame), 90, 210, frame);
    expect(after.x).toBeCloseTo(before.x, 9);
    expect(after.y).toBeCloseTo(before.y, 9);
  });

  it('cannot be panned off the picture', () => {
    const view = panBy({ zoom: 2, x: 10, y: 10 }, 1e6, -1e6, picture);
    expect(view).toEqual({ zoom: 2, x: 0, y: 599 });
  });

  it('has a scale bar of a round length that fits', () => {
    const bar = scaleBar({ zoom: 0.5, x: 0, y: 0 }, 10e-6, 120);
    expect(bar).toEqual({ length: 0.002, pixels: 100 });
  });
});

describe('a profile', () => {
  it('follows a direction counter-clockwise from the right as displayed, rows running down', () => {
    const width = 41;
    const counts = new Float32Array(width * width);
    for (let y = 0; y < width; y++) for (let x = 0; x < width; x++) counts[y * width + x] = x - y;
    const plane = { width, height: width, counts };
    const up = profileAlong(plane, { x: 20, y: 20 }, Math.PI / 2, 10);
    expect(up.counts[up.at.indexOf(5)]).toBeCloseTo(5, 4);
    const diagonal = profileAlong(plane, { x: 20, y: 20 }, Math.PI / 4, 10);
    expect(diagonal.counts[diagonal.at.indexOf(5)]).toBeCloseTo(5 * Math.SQRT2, 4);
  });

  it('has no value where the picture ends', () => {
    const plane = { width: 8, height: 8, counts: new Float32Array(64) };
    expect(Number.isNaN(profileAlong(plane, { x: 4, y: 4 }, 0, 20).counts[0])).toBe(true);
  });
});
