import type { Response } from 'express';
import type { Deps } from '#server/deps.ts';
import {
  originalOf,
  pixelsOf,
  readExposure,
  takeExposure,
  thumbnailOf,
  withdraw,
} from '#server/features/exposures/service.ts';
import { route, type Route } from '#server/http/route.ts';
import { fileOf, oneFile } from '#server/http/upload.ts';
import {
  getExposure,
  getExposurePicture,
  getExposurePixels,
  getExposureThumbnail,
  uploadExposure,
  withdrawExposure,
  type PictureFormat,
} from '#shared/contracts/exposures.ts';

const mediaTypes: Record<PictureFormat, string> = {
  png: 'image/png',
  tiff: 'image/tiff',
  jpeg: 'image/jpeg',
  bmp: 'image/bmp',
};

/** A picture never changes under its id. */
function sendBytes(res: Response, type: string, bytes: Uint8Array): void {
  res.setHeader('Cache-Control', 'private, max-age=31536000, immutable');
  res.type(type).send(Buffer.from(bytes.buffer, bytes.byteOffset, bytes.byteLength));
}

export function exposureRoutes(deps: Deps): Route[] {
  return [
    route(
      uploadExposure,
      ({ actor, params, body, req }) => takeExposure(deps, actor, params.caseId, fileOf(req), body),
      [oneFile],
    ),
    route(getExposure, ({ actor, params }) => readExposure(deps, actor, params.exposureId)),
    route(withdrawExposure, ({ actor, params, body }) =>
      withdraw(deps, actor, params.exposureId, body.reason),
    ),
    route(getExposurePicture, async ({ params, res }) => {
      const { row, bytes } = await originalOf(deps, params.exposureId);
      res.attachment(row.exposure.fileName);
      sendBytes(res, mediaTypes[row.exposure.format], bytes);
    }),
    route(getExposurePixels, async ({ params, res }) =>
      sendBytes(res, 'application/octet-stream', await pixelsOf(deps, params.exposureId)),
    ),
    route(getExposureThumbnail, async ({ params, res }) =>
      sendBytes(res, 'image/png', await thumbnailOf(deps, params.exposureId)),
    ),
  ];
}
