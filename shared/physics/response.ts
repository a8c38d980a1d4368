/** sRGB transfer functions of IEC 61966-2-1; values 0 … 1. */
export function srgbDecode(value: number): number {
  return value <= 0.04045 ? value / 12.92 : ((value + 0.055) / 1.055) ** 2.4;
}

export function srgbEncode(linear: number): number {
  return linear <= 0.0031308 ? 12.92 * linear : 1.055 * linear ** (1 / 2.4) - 0.055;
}

/**
 * Linear counts for every code from 0 to `fullScale`, so that full scale stays full scale. `dark` (in codes) is taken off
 * linear data; negative values are kept.
 */
export function linearTable(encoding: 'linear' | 'srgb', fullScale: number, dark: number): Float32Array {
  const table = new Float32Array(fullScale + 1);
  for (let code = 0; code <= fullScale; code++)
    table[code] = encoding === 'srgb' ? srgbDecode(code / fullScale) * fullScale : code - dark;
  return table;
}
