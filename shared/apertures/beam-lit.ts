/**
 * Along a slit that is longer than the beam is wide the light, not the opening, ends the pattern: a Gaussian beam of
 * 1/e² intensity diameter d gives the factor exp(−(πdu)²/2), the beam's own far field (ISO 11145 beam width; transform of
 * a Gaussian, Bracewell). `extent` in metres, `u` in cycles per metre.
 */
export function beamLitIntensity(extent: number, u: number): number {
  const x = Math.PI * extent * u;
  // Beyond 12 it is below 1e-31; almost all of a picture lies there, and exp is slow.
  if (x > 12 || x < -12) return 0;
  return Math.exp(-0.5 * x * x);
}
