interface Raster {
  readonly width: number;
  readonly height: number;
  readonly fullScale: number;
  /** True where colours are kept in coarser blocks than brightness (JPEG). */
  readonly lossy: boolean;
}

/** Blocks along the shorter side: fine enough for fringes, coarse enough to average noise away. */
const blocksAcross = 150;
/** Within fewer pixels than these a JPEG tells little of colours. */
const lossyBlock = 8;
/** Fringes are what differs from the mean over this share of the shorter side. */
const neighbourhood = 0.12;
/** Fringes weaker than this share of the strongest channel's are crosstalk or stray light at most. */
const leastFringes = 0.1;
/** Levels of the strongest channel at which the weaker one is looked at. */
const levels = 24;
/**
 * Share of the weaker channel's fringes that the strongest one may leave unexplained. On the project's own simulations one
 * laser with crosstalk and coloured room light stays below 0.3, also through a JPEG; a second one of 532 beside 633 nm with
 * the same opening lies above 0.35 in most pictures that are exposed for their side lobes.
 */
const mostUnexplained = 0.33;

/**
 * True when a weaker channel shows the fringes of the strongest one through whatever response, or hardly any: the light of
 * one laser. False when it has fringes of its own: equal brightness of the strongest channel then goes with different ones
 * of the weaker, in a way that neighbouring blocks share (noise is not shared). Clipped blocks are left out.
 */
export function followsAnother(weaker: Uint16Array, strongest: Uint16Array, raster: Raster): boolean {
  const { field: own, columns, reach } = blocksOf(weaker, raster);
  const guide = blocksOf(strongest, raster).field;
  const fringes = (field: Float64Array) => shared(lessLocalMean(field, columns, reach), columns);
  const owns = fringes(own);
  const guides = fringes(guide);
  const residual = lessWhatFollows(own, guide);
  if (!(owns > leastFringes * guides)) return true;
  return fringes(residual) < mostUnexplained * owns;
}

/** Square roots of block means, so that side lobes count beside the centre; NaN where a pixel is clipped. */
function blocksOf(plane: Uint16Array, raster: Raster) {
  const short = Math.min(raster.width, raster.height);
  const size = Math.max(raster.lossy ? lossyBlock : 1, Math.floor(short / blocksAcross));
  const columns = Math.floor(raster.width / size);
  const rows = Math.floor(raster.height / size);
  const field = new Float64Array(columns * rows);
  for (let j = 0; j < rows; j++)
    for (let i = 0; i < columns; i++) {
      let sum = 0;
      for (let y = 0; y < size; y++)
        for (let x = 0; x < size; x++) {
          const code = plane[(j * size + y) * raster.width + i * size + x];
          sum += code >= 0.98 * raster.fullScale ? NaN : code;
        }
      field[j * columns + i] = Math.sqrt(sum / (size * size));
    }
  const reach = Math.max(1, Math.round((neighbourhood * short) / size / 2));
  return { field, columns, reach };
}

/** The fringes of a field: what differs from the mean of the neighbourhood, so that a slope of stray light is gone. */
function lessLocalMean(field: Float64Array, columns: number, reach: number): Float64Array {
  const rows = field.length / columns;
  // Sums and counts of everything above and to the left, so that any rectangle is four look-ups.
  const sums = new Float64Array((columns + 1) * (rows + 1));
  const counts = new Float64Array(sums.length);
  const at = (i: number, j: number) => j * (columns + 1) + i;
  for (let j = 0; j < rows; j++)
    for (let i = 0; i < columns; i++) {
      const value = field[j * columns + i];
      const here = at(i + 1, j + 1);
      for (const [table, add] of [
        [sums, Number.isNaN(value) ? 0 : value],
        [counts, Number.isNaN(value) ? 0 : 1],
      ] as const)
        table[here] = add + table[at(i, j + 1)] + table[at(i + 1, j)] - table[at(i, j)];
    }
  return field.map((value, k) => {
    const left = Math.max(0, (k % columns) - reach);
    const right = Math.min(columns, (k % columns) + reach + 1);
    const top = Math.max(0, Math.floor(k / columns) - reach);
    const bottom = Math.min(rows, Math.floor(k / columns) + reach + 1);
    const within = (table: Float64Array) =>
      table[at(right, bottom)] - table[at(left, bottom)] - table[at(right, top)] + table[at(left, top)];
    return value - within(sums) / within(counts);
  });
}

/** The field less a line through it at each level of the guide. */
function lessWhatFollows(field: Float64Array, guide: Float64Array): Float64Array {
  const order = Array.from(guide.keys())
    .filter((k) => !Number.isNaN(guide[k] + field[k]))
    .sort((a, b) => guide[a] - guide[b]);
  const residual = new Float64Array(field.length).fill(NaN);
  for (let level = 0; level < levels; level++) {
    const members = order.slice(
      Math.floor((level * order.length) / levels),
      Math.floor(((level + 1) * order.length) / levels),
    );
    const mean = { guide: 0, field: 0 };
    for (const k of members) {
      mean.guide += guide[k] / members.length;
      mean.field += field[k] / members.length;
    }
    let along = 0;
    let spread = 1e-12;
    for (const k of members) {
      along += (guide[k] - mean.guide) * (field[k] - mean.field);
      spread += (guide[k] - mean.guide) ** 2;
    }
    for (const k of members) residual[k] = field[k] - mean.field - (along / spread) * (guide[k] - mean.guide);
  }
  return residual;
}

/** What of a field neighbouring blocks share: its variance without the noise. */
function shared(field: Float64Array, columns: number): number {
  let sum = 0;
  let n = 0;
  for (let k = 0; k + 1 < field.length; k++) {
    const product = field[k] * field[k + 1];
    if ((k + 1) % columns === 0 || Number.isNaN(product)) continue;
    sum += product;
    n += 1;
  }
  return n === 0 ? 0 : sum / n;
}
