/** sin(πx)/(πx), 1 at 0. Dimensionless. */
export function sinc(x: number): number {
  const a = Math.PI * x;
  return Math.abs(a) < 1e-4 ? 1 - (a * a) / 6 : Math.sin(a) / a;
}
