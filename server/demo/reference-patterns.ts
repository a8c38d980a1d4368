import { existsSync } from 'node:fs';
import { readFile } from 'node:fs/promises';
import { fileURLToPath } from 'node:url';
import { join } from 'node:path';
import { z } from 'zod';
import { referencePatternSchema } from '#shared/contracts/references.ts';

const manifestSchema = z.object({ patterns: z.array(z.string().regex(/^[\w-]+\/[\w-]+\.json$/i)) });

/** The designed openings of the folder `reference-patterns`. Throws where a file does not keep the contract. */
export async function readReferencePatterns(): Promise<z.output<typeof referencePatternSchema>[]> {
  const bundled = fileURLToPath(new URL('./reference-patterns', import.meta.url));
  const folder = existsSync(bundled) ? bundled : 'reference-patterns';
  const read = async (name: string): Promise<unknown> =>
    JSON.parse(await readFile(join(folder, name), 'utf8'));
  const { patterns } = manifestSchema.parse(await read('manifest.json'));
  return Promise.all(patterns.map(async (name) => referencePatternSchema.parse(await read(name))));
}
