import type { Request, RequestHandler } from 'express';
import multer from 'multer';
import { Refusal } from '#server/http/refusal.ts';
import { pictureLimits } from '#shared/contracts/exposures.ts';

const receive = multer({
  storage: multer.memoryStorage(),
  limits: { fileSize: pictureLimits.bytes, files: 1, fields: 10, fieldSize: 10_000, parts: 12 },
});

/** Takes one file of the field `file`, within the limits, before the form fields are parsed. */
export const oneFile: RequestHandler = receive.single('file');

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
  // eslint-disable-next-line no-control-regex
  return base.replace(/[\u0000-\u001f\u007f]/g, '').slice(-180) || 'picture';
}
