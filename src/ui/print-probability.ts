/** "98 %", "under 1 %", "over 99 %": a stated probability is never printed as none or as certainty. */
export function printProbability(p: number): string {
  if (p < 0.01) return 'under 1\u00a0%';
  if (p > 0.99) return 'over 99\u00a0%';
  return `${Math.round(100 * p)}\u00a0%`;
}
