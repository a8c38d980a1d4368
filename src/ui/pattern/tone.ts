export type Scale = 'log' | 'root' | 'linear';

/** How counts become grey levels 0 … 255: black point, the least step that is shown apart, and the brightest count. */
export interface Tone {
  readonly scale: Scale;
  readonly black: number;
  /** Counts above black where the logarithm begins to bend into a straight line: about the noise. */
  readonly floor: number;
  readonly peak: number;
}

/** A tone for a picture: from its background and noise to its brightest pixel. */
export function toneOf(counts: Float32Array, black: number, noise: number, scale: Scale): Tone {
  let peak = 1;
  for (const c of counts) if (c - black > peak) peak = c - black;
  return { scale, black, floor: Math.max(noise, peak * 1e-5, 1e-6), peak };
}

/** 0 … 255 for counts; below the black point 0, above the peak 255. */
export function level(tone: Tone, counts: number): number {
  const above = Math.min(Math.max(counts - tone.black, 0), tone.peak);
  switch (tone.scale) {
    case 'log':
      return (255 * Math.log1p(above / tone.floor)) / Math.log1p(tone.peak / tone.floor);
    case 'root':
      return 255 * Math.sqrt(above / tone.peak);
    case 'linear':
      return (255 * above) / tone.peak;
  }
}

/** Paints a plane in the colours of a map; `flat` marks pixels that get the flat colour instead. */
export function paintPlane(
  counts: Float32Array,
  tone: Tone,
  map: Uint8ClampedArray,
  rgba: Uint8ClampedArray,
  flat?: { readonly at: (i: number) => boolean; readonly colour: readonly [number, number, number] },
): void {
  for (let i = 0; i < counts.length; i++) {
    const o = 4 * i;
    if (flat?.at(i)) {
      rgba[o] = flat.colour[0];
      rgba[o + 1] = flat.colour[1];
      rgba[o + 2] = flat.colour[2];
    } else {
      const k = 3 * Math.round(level(tone, counts[i]));
      rgba[o] = map[k];
      rgba[o + 1] = map[k + 1];
      rgba[o + 2] = map[k + 2];
    }
    rgba[o + 3] = 255;
  }
}
