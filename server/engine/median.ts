/** The k-th smallest value (0 = smallest); reorders `values`. Hoare's selection. */
export function selectInPlace(values: Float64Array | Float32Array, k: number): number {
  let low = 0;
  let high = values.length - 1;
  while (low < high) {
    const pivot = values[(low + high) >> 1];
    let i = low;
    let j = high;
    while (i <= j) {
      while (values[i] < pivot) i++;
      while (values[j] > pivot) j--;
      if (i <= j) {
        const t = values[i];
        values[i] = values[j];
        values[j] = t;
        i++;
        j--;
      }
    }
    if (k <= j) high = j;
    else if (k >= i) low = i;
    else break;
  }
  return values[k];
}

/** The p-quantile (0 … 1) of values, which are reordered; NaN of nothing. */
export function quantileInPlace(values: Float64Array | Float32Array, p: number): number {
  if (values.length === 0) return Number.NaN;
  return selectInPlace(values, Math.min(values.length - 1, Math.floor(p * values.length)));
}
