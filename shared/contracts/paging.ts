import { z } from 'zod';

export const pageQuery = {
  page: z.coerce.number().int().min(1).max(100_000).default(1),
  pageSize: z.coerce.number().int().min(1).max(200).default(50),
};

/** One page of rows with the number of all. */
export function pageOf<T extends z.ZodType>(row: T) {
  return z.object({
    rows: z.array(row),
    total: z.number().int(),
    page: z.number().int(),
    pageSize: z.number().int(),
  });
}

export const idParam = <K extends string>(key: K) => z.object({ [key]: z.uuid() } as Record<K, z.ZodUUID>);

/** The version that an edit was made on; the database counts in 32 bits. */
export const versionSchema = z.number().int().min(1).max(2_147_483_647);

export const timestampSchema = z.iso.datetime();

/** A short line of text: trimmed, no control characters. */
export const lineSchema = (max: number) =>
  z
    .string()
    .trim()
    .max(max, `At most ${max} characters.`)
    .regex(/^[^\u0000-\u001f\u007f]*$/, 'Line breaks and control characters are not allowed here.');

export const requiredLineSchema = (max: number, what: string) => lineSchema(max).min(1, `Enter ${what}.`);

/** Longer text with line breaks. */
export const textSchema = (max: number) => z.string().trim().max(max, `At most ${max} characters.`);
