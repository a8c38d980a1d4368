import { readFileSync } from 'node:fs';

/** One problem of the NIST/ITL Statistical Reference Datasets, nonlinear regression, as its file gives it. */
export interface NistDataset {
  readonly starts: readonly [number[], number[]];
  readonly certified: number[];
  readonly deviations: number[];
  readonly sumOfSquares: number;
  readonly degrees: number;
  readonly x: number[];
  readonly y: number[];
}

export function readNist(name: string): NistDataset {
  const lines = readFileSync(new URL(`./nist/${name}.dat`, import.meta.url), 'ascii').split(/\r?\n/);
  const parameters = lines
    .filter((line) => /^\s*b\d+\s*=/.test(line))
    .map((line) => line.split('=')[1].trim().split(/\s+/).map(Number));
  const after = (label: string) => Number(lines.find((line) => line.startsWith(label))?.split(':')[1]);
  const from = lines.findLastIndex((line) => line.startsWith('Data:'));
  const rows = lines
    .slice(from + 1)
    .map((line) => line.trim().split(/\s+/).map(Number))
    .filter((row) => row.length === 2);
  const count = Number(lines.find((line) => line.startsWith('Number of Observations:'))?.split(':')[1]);
  if (rows.length !== count) throw new Error(`${name}: ${rows.length} rows for ${count} observations`);
  return {
    starts: [parameters.map((p) => p[0]), parameters.map((p) => p[1])],
    certified: parameters.map((p) => p[2]),
    deviations: parameters.map((p) => p[3]),
    sumOfSquares: after('Residual Sum of Squares:'),
    degrees: after('Degrees of Freedom:'),
    x: rows.map((row) => row[1]),
    y: rows.map((row) => row[0]),
  };
}
