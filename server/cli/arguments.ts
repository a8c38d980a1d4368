import { availableParallelism } from 'node:os';
import { parseArgs } from 'node:util';
import { benchValuesSchema, type BenchValues } from '#shared/contracts/benches.ts';
import { toSi, type Unit } from '#shared/quantities.ts';

/** What the caller asked for. */
export type Command =
  | { readonly kind: 'help' }
  | { readonly kind: 'picture'; readonly file: string; readonly bench: BenchValues; readonly json: boolean }
  | {
      readonly kind: 'cases';
      readonly file: string;
      readonly out: string | null;
      readonly threads: number;
    };

/** Arguments that make no sense; the message says what to write instead. */
export class UsageError extends Error {}

const options = {
  cases: { type: 'string' },
  out: { type: 'string' },
  threads: { type: 'string' },
  'wavelength-nm': { type: 'string' },
  'wavelength-u-nm': { type: 'string' },
  'distance-mm': { type: 'string' },
  'distance-u-mm': { type: 'string' },
  'pixel-um': { type: 'string' },
  'pixel-u-um': { type: 'string' },
  geometry: { type: 'string' },
  encoding: { type: 'string' },
  'bit-depth': { type: 'string' },
  'dark-level': { type: 'string' },
  mirrored: { type: 'boolean' },
  json: { type: 'boolean' },
  help: { type: 'boolean', short: 'h' },
} as const;

type Option = keyof typeof options;
type Given = Partial<Record<Option, string | boolean>>;

const setupOptions: readonly Option[] = [
  'wavelength-nm',
  'wavelength-u-nm',
  'distance-mm',
  'distance-u-mm',
  'pixel-um',
  'pixel-u-um',
  'geometry',
  'encoding',
  'bit-depth',
  'dark-level',
  'mirrored',
  'json',
];

/** Reads the words after the command's name. Throws a UsageError with a sentence for each fault. */
export function parseArguments(words: readonly string[]): Command {
  const { values, positionals } = split(words);
  if (values.help) return { kind: 'help' };
  if (values.cases !== undefined) {
    refuseTogether(values, positionals);
    return {
      kind: 'cases',
      file: text(values, 'cases'),
      out: values.out === undefined ? null : text(values, 'out'),
      threads: threadsOf(values),
    };
  }
  if (positionals.length === 0) throw new UsageError('Name a picture, or many with --cases cases.jsonl.');
  if (positionals.length > 1)
    throw new UsageError(`Name one picture, not ${positionals.length}; many pictures go with --cases.`);
  for (const key of ['out', 'threads'] as const)
    if (values[key] !== undefined) throw new UsageError(`--${key} goes with --cases only.`);
  return { kind: 'picture', file: positionals[0], bench: benchOf(values), json: values.json === true };
}

function split(words: readonly string[]): { values: Given; positionals: string[] } {
  try {
    return parseArgs({ args: [...words], options, allowPositionals: true });
  } catch (error) {
    const sentence = error instanceof Error ? error.message.split('. ')[0].replace(/\.$/, '') : '';
    throw new UsageError(`${sentence}. See --help for every option.`);
  }
}

function refuseTogether(values: Given, positionals: readonly string[]): void {
  if (positionals.length > 0)
    throw new UsageError(
      `"${positionals[0]}" and --cases cannot go together: give one picture or a list of cases.`,
    );
  const extra = setupOptions.find((key) => values[key] !== undefined);
  if (extra) throw new UsageError(`--${extra} goes with one picture; with --cases each line says it.`);
}

function threadsOf(values: Given): number {
  if (values.threads === undefined) return Math.max(1, Math.min(4, availableParallelism()));
  const threads = numberOf(values, 'threads');
  if (!Number.isInteger(threads) || threads < 1 || threads > 64)
    throw new UsageError(`--threads must be a whole number from 1 to 64, not ${text(values, 'threads')}.`);
  return threads;
}

/** The set-up, held to the same limits as a bench in the product. */
function benchOf(values: Given): BenchValues {
  const quantity = (value: Option, u: Option, unit: Unit) => {
    if (values[value] === undefined) throw new UsageError(`--${value} is needed with a picture.`);
    return {
      value: toSi(numberOf(values, value), unit),
      u: values[u] === undefined ? 0 : toSi(numberOf(values, u), unit),
    };
  };
  const bitDepth = values['bit-depth'] === undefined ? 8 : numberOf(values, 'bit-depth');
  if (![8, 10, 12, 14, 16].includes(bitDepth))
    throw new UsageError(`--bit-depth must be 8, 10, 12, 14 or 16, not ${text(values, 'bit-depth')}.`);
  return checkedBench({
    geometry: oneOf(values, 'geometry', ['sensor', 'screen', 'lens']),
    wavelength: quantity('wavelength-nm', 'wavelength-u-nm', 'nm'),
    distance: quantity('distance-mm', 'distance-u-mm', 'mm'),
    pixelPitch: quantity('pixel-um', 'pixel-u-um', 'um'),
    encoding: oneOf(values, 'encoding', ['linear', 'srgb']),
    bitDepth,
    darkLevel: values['dark-level'] === undefined ? null : numberOf(values, 'dark-level'),
    mirrored: values.mirrored === true,
  });
}

function checkedBench(draft: unknown): BenchValues {
  const parsed = benchValuesSchema.safeParse(draft);
  if (!parsed.success) throw new UsageError(parsed.error.issues.map((issue) => issue.message).join(' '));
  return parsed.data;
}

function text(values: Given, key: Option): string {
  const value = values[key];
  if (typeof value !== 'string' || value === '') throw new UsageError(`--${key} needs a value.`);
  return value;
}

function numberOf(values: Given, key: Option): number {
  const value = Number(text(values, key));
  if (!Number.isFinite(value)) throw new UsageError(`--${key} must be a number, not "${text(values, key)}".`);
  return value;
}

function oneOf(values: Given, key: Option, words: readonly string[]): string {
  if (values[key] === undefined) return words[0];
  const word = text(values, key);
  if (!words.includes(word))
    throw new UsageError(
      `--${key} must be ${words.slice(0, -1).join(', ')} or ${words.at(-1)}, not "${word}".`,
    );
  return word;
}
