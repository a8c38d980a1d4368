/** A seeded generator of numbers in [0, 1): mulberry32, period 2³². For tests, demo data and subsampling, not for secrets. */
export function seededRandom(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

/** A standard normal number (Box–Muller). */
export function normalFrom(random: () => number): number {
  return Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random());
}

/** A Poisson number: by multiplication below a mean of 30 (Knuth), by the rounded normal above. */
export function poissonFrom(random: () => number, mean: number): number {
  if (mean <= 0) return 0;
  if (mean > 30) return Math.max(0, Math.round(mean + Math.sqrt(mean) * normalFrom(random)));
  const limit = Math.exp(-mean);
  let n = 0;
  for (let product = random(); product > limit; product *= random()) n += 1;
  return n;
}
