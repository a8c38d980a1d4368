import type { Request, RequestHandler } from 'express';
import multer, { MulterError } from 'multer';
import { Refusal } from '#server/http/refusal.ts';
import { pictureLimits } from '#shared/contracts/exposures.ts';

const receive = multer({
  storage: multer.memoryStorage(),
  limits: { fileSize: pictureLimits.bytes, files: 1, fields: 10, fieldSize: 10_000, parts: 12 },
});

/** Takes one file of the field `file`, within the limits, before the form fields are parsed. */
export const oneFile: RequestHandler = (req, res, next) =>
  receive.single('file')(req, res, (error: unknown) =>
    next(
      error === undefined || error === null || error instanceof MulterError
        ? error
        : new Refusal(
            'malformed-request',
            'The upload broke off or is not a multipart form. Nothing was stored; send the file again.',
          ),
    ),
  );

/** The file that came, its name as people write it and without folders. Throws a Refusal when none did. */
export function fileOf(req: Request): { name: string; bytes: Uint8Array } {
  const { file } = req;
  if (!file)
    throw new Refusal('file-missing', 'No file came with the request. Choose a picture and send it again.');
  // The parser reads header bytes as Latin-1; browsers write UTF-8.
  const name = Buffer.from(file.originalname, 'latin1').toString('utf8');
  return { name: cleanName(name), bytes: file.buffer };
}

function cleanName(name: string): string {
  const base = name.split(/[\\/]/).pop() ?? '';

  return base.replace(/[\u0000-\u001f\u007f]/g, '').slice(-180) || 'picture';
}
