import { decode } from 'fast-png';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { demoPicture } from '#server/demo/demo-picture.ts';
import { sha256 } from '#server/storage/disk-storage.ts';
import { addBench, editBench } from '#shared/contracts/benches.ts';
import { getCase, openCase } from '#shared/contracts/cases.ts';
import {
  getExposure,
  getExposurePicture,
  getExposurePixels,
  getExposureThumbnail,
  pictureLimits,
  uploadExposure,
  withdrawExposure,
} from '#shared/contracts/exposures.ts';
import { seededRandom } from '#shared/physics/random.ts';
import type { Caller } from '#tests/support/caller.ts';
import { badPictures } from '#tests/support/bad-pictures.ts';
import { pngFile } from '#tests/support/png-files.ts';
import { benchDraft, caseDraft, pinholePicture } from '#tests/support/specimens.ts';
import { createTestApp, type TestApp } from '#tests/support/test-app.ts';
import { tiffFile } from '#tests/support/tiff-files.ts';

let test: TestApp;
let analyst: Caller;
let benchId: string;

beforeAll(async () => {
  test = await createTestApp({ idle: true });
  analyst = await test.signInAs('analyst');
  ({ id: benchId } = await analyst.call(addBench, { body: { ...benchDraft, name: 'Of the exposures' } }));
});
afterAll(() => test.close());

const newCase = async (draft: object = caseDraft) => (await analyst.call(openCase, { body: draft })).id;
const noSuchId = '7b0c2f2e-43f0-4b7c-9e1f-0f6c1f3c9a10';

function upload(caseId: string, file: { name: string; bytes: Uint8Array }, bench = benchId) {
  return analyst.call(uploadExposure, { params: { caseId }, body: { benchId: bench }, file });
}

/** The problem of a refused upload, after which the case and the store are as before. */
async function refusedUpload(
  code: Parameters<Caller['refused']>[1],
  file: { name: string; bytes: Uint8Array },
  bench = benchId,
) {
  const caseId = await newCase();
  const input = { params: { caseId }, body: { benchId: bench }, file };
  const problem = await analyst.refused(uploadExposure, code, input);
  expect((await analyst.call(getCase, { params: { caseId } })).exposures).toEqual([]);
  expect(await test.deps.storage.find(sha256(file.bytes))).toBeUndefined();
  return problem;
}

describe('a file that cannot be measured is refused with the mend, and nothing of it is stored', () => {
  it.each(badPictures.map((bad) => [bad.what, bad] as const))('%s', async (_, bad) => {
    const problem = await refusedUpload(bad.code, { name: bad.name, bytes: await bad.file() });
    expect(problem.detail).toMatch(bad.says);
  });

  it('a file of more bytes than are taken', async () => {
    const bytes = new Uint8Array(pictureLimits.bytes + 1);
    const problem = await refusedUpload('file-too-large', { name: 'a.png', bytes });
    expect(problem.detail).toMatch(/larger than 64 MiB.*Crop it/);
  });
});

describe('a picture without a pattern is refused at once, and nothing of it is stored', () => {
  const width = 200;
  const height = 160;
  const filled = (codeAt: (i: number) => number) =>
    pngFile({ width, height, data: Uint16Array.from({ length: width * height }, (_, i) => codeAt(i) << 4) });
  const random = seededRandom(5);
  const grain = (spread: number) => Math.round(spread * random());

  it.each([
    ['all black', () => filled(() => 38 + grain(5)), /black.*exposure time/],
    ['all white', () => filled(() => 4095), /whole picture is saturated.*Shorten the exposure/],
    ['without contrast', () => filled(() => 1800 + grain(60)), /no contrast.*photograph it again/],
    [
      'saturated over more than half',
      () => filled((i) => (i % width < 130 ? 4095 : 300 + grain(60))),
      /More than half.*saturated.*attenuate/,
    ],
  ])('%s', async (_, file, says) => {
    const problem = await refusedUpload('picture-unusable', { name: 'a.png', bytes: file() });
    expect(problem.detail).toMatch(says);
  });
});

describe('an upload that is not right', () => {
  it('without a file says so', async () => {
    const problem = await analyst.refused(uploadExposure, 'file-missing', {
      params: { caseId: await newCase() },
      body: { benchId },
    });
    expect(problem.detail).toMatch(/Choose a picture/);
  });

  it('without a bench, or with one that does not exist, names the field', async () => {
    const caseId = await newCase();
    for (const body of [{}, { benchId: 'none' }, { benchId: noSuchId }]) {
      const input = { params: { caseId }, body, file: pinholePicture() };
      const problem = await analyst.refused(uploadExposure, 'invalid-input', input);
      expect(problem.errors?.map((e) => e.pointer)).toEqual(['#/benchId']);
    }
  });

  it('in a case that does not exist is not found', async () => {
    await analyst.refused(uploadExposure, 'not-found-or-not-yours', {
      params: { caseId: noSuchId },
      body: { benchId },
      file: pinholePicture(),
    });
  });
});

describe('the same file', () => {
  it('is taken once in a case, and the refusal names the exposure that holds it', async () => {
    const caseId = await newCase();
    const file = pinholePicture(2);
    await upload(caseId, file);
    const problem = await analyst.refused(uploadExposure, 'same-file-in-case', {
      params: { caseId },
      body: { benchId },
      file: { ...file, name: 'copy.png' },
    });
    expect(problem.detail).toMatch(/exposure 1 of this case already \(hole-2\.png\)/);
    await upload(await newCase(), file);
  });

  it('is taken once when it comes twice at the same moment', async () => {
    const caseId = await newCase();
    const input = { params: { caseId }, body: { benchId }, file: pinholePicture(3) };
    const statuses = (
      await Promise.all([analyst.send(uploadExposure, input), analyst.send(uploadExposure, input)])
    ).map((response) => response.status);
    expect(statuses.sort()).toEqual([201, 409]);
    expect((await analyst.call(getCase, { params: { caseId } })).exposures).toHaveLength(1);
  });

  it('may come again once the other is withdrawn', async () => {
    const caseId = await newCase();
    const { id } = await upload(caseId, pinholePicture(4));
    await analyst.call(withdrawExposure, { params: { exposureId: id }, body: { reason: 'Wrong bench' } });
    expect((await upload(caseId, pinholePicture(4))).number).toBe(2);
  });
});

describe('an exposure shows at once', () => {
  it('size, depth, saturated share, centre and warnings', async () => {
    const exposure = await upload(await newCase(), pinholePicture(5));
    expect(exposure).toMatchObject({
      number: 1,
      width: 200,
      height: 180,
      format: 'png',
      bitDepth: 12,
      fullScale: 65520,
      codeStep: 16,
      channel: 'grey',
      warnings: [],
      farFieldForDrawing: null,
      uploadedBy: { name: 'Tamsin Orrel' },
    });
    expect(exposure.facts.saturatedShare).toBe(0);
    const { center } = exposure.facts;
    expect(Math.hypot(center!.x - 103.3, center!.y - 86.2)).toBeLessThan(2 * center!.u);
    expect(exposure.latest).toMatchObject({ state: 'queued', share: 0, verdict: null });
  });

  it("the Fresnel number of the drawing's size: N = a²/(λL) (Goodman, Introduction to Fourier Optics, 4.3)", async () => {
    const near = await analyst.call(addBench, {
      body: {
        ...benchDraft,
        name: 'Near',
        geometry: 'sensor',
        distance: { value: 0.5, u: 0.001 },
        darkLevel: null,
      },
    });
    const values = { diameter: 0.6e-3 };
    const drawing = { aperture: { family: 'pinhole', values }, limits: {} };
    const caseId = await newCase({ ...caseDraft, drawing });
    const exposure = await upload(caseId, pinholePicture(6), near.id);
    expect(exposure.farFieldForDrawing?.fresnelNumber).toBeCloseTo(0.3e-3 ** 2 / (632.8e-9 * 0.5), 6);
    // 0.1 as the limit is common practice, no source.
    expect(exposure.farFieldForDrawing?.distanceNeeded).toBeCloseTo(0.3e-3 ** 2 / (632.8e-9 * 0.1), 6);
    expect(exposure.farFieldForDrawing?.holds).toBe(false);
    expect(exposure.warnings).toEqual(
      expect.arrayContaining(['near-field-for-drawing', 'unknown-dark-level']),
    );
  });

  it('the bench as it was, whatever becomes of the bench', async () => {
    const body = { ...benchDraft, name: 'Changing' };
    const bench = await analyst.call(addBench, { body });
    const exposure = await upload(await newCase(), pinholePicture(7), bench.id);
    await analyst.call(editBench, {
      params: { benchId: bench.id },
      body: { ...body, distance: { value: 0.2, u: 0.0002 }, version: bench.version },
    });
    const again = await analyst.call(getExposure, { params: { exposureId: exposure.id } });
    expect(again.bench).toMatchObject({ distance: { value: 0.1, u: 0.0001 }, version: bench.version });
  });

  it('its name as people write it, without folders', async () => {
    const file = { ...pinholePicture(8), name: 'C:\\Bilder\\Öffnung µ7.png' };
    expect((await upload(await newCase(), file)).fileName).toBe('Öffnung µ7.png');
  });
});

describe('a picture of 16 bits', () => {
  const bench = { ...benchDraft, bitDepth: 16, darkLevel: 600 } as const;
  const taken = decode(
    demoPicture(
      {
        opening: { family: 'pinhole', values: { diameter: 0.6e-3 } },
        orientation: 0,
        width: 180,
        height: 160,
        center: { x: 91.2, y: 78.4 },
        peak: 0.9,
        seed: 77,
      },
      bench,
    ),
  );
  const { width, height } = taken;
  const data = Uint16Array.from(taken.data);

  it.each([
    ['PNG', 'deep.png', 'image/png', () => pngFile({ width, height, data })],
    ['TIFF', 'deep.tif', 'image/tiff', () => tiffFile({ width, height, data })],
  ])(
    'keeps every bit from the %s file to the pixels, and the file as it came',
    async (_, name, type, file) => {
      const { id: deepBench } = await analyst.call(addBench, { body: { ...bench, name } });
      const bytes = file();
      const exposure = await upload(await newCase(), { name, bytes }, deepBench);
      expect(exposure).toMatchObject({
        bitDepth: 16,
        fullScale: 65535,
        sha256: sha256(bytes),
        byteSize: bytes.length,
      });
      const params = { exposureId: exposure.id };
      const pixels = await analyst.send(getExposurePixels, { params });
      const expected = Buffer.from(data.buffer, data.byteOffset, data.byteLength);
      expect(expected.equals(pixels.body as Buffer)).toBe(true);
      const picture = await analyst.raw.get(`/api/exposures/${exposure.id}/picture`).responseType('blob');
      expect(bytes.equals(picture.body as Buffer)).toBe(true);
      expect(picture.headers).toMatchObject({
        'content-type': type,
        'content-disposition': `attachment; filename="${name}"`.replace(/"/g, ''),
        'x-content-type-options': 'nosniff',
        'cache-control': expect.stringMatching(/private.*immutable/),
      });
    },
  );
});

describe('the small picture of an exposure', () => {
  it('is 192 × 192 grey, bright at the centre of the pattern', async () => {
    const exposure = await upload(await newCase(), pinholePicture(10));
    const params = { exposureId: exposure.id };
    const response = await analyst.send(getExposureThumbnail, { params });
    const small = decode(response.body as Buffer);
    expect(small).toMatchObject({ width: 192, height: 192, channels: 1, depth: 8 });
    expect(small.data[96 * 192 + 96]).toBeGreaterThan(245);
    expect(small.data[5 * 192 + 5]).toBeLessThan(200);
  });
});

describe('withdrawing an exposure', () => {
  it('keeps it with the reason, and nothing is identified in it any more', async () => {
    const caseId = await newCase();
    const { id } = await upload(caseId, pinholePicture(11));
    const params = { exposureId: id };
    const withdrawn = await analyst.call(withdrawExposure, { params, body: { reason: 'Out of focus' } });
    expect(withdrawn.withdrawn).toMatchObject({ by: { name: 'Tamsin Orrel' }, reason: 'Out of focus' });
    expect(withdrawn.can).toEqual({ identify: false, withdraw: false });
    await analyst.refused(withdrawExposure, 'wrong-state', { params, body: { reason: 'Again' } });
  });

  it('wants a reason', async () => {
    const { id } = await upload(await newCase(), pinholePicture(12));
    const problem = await analyst.refused(withdrawExposure, 'invalid-input', {
      params: { exposureId: id },
      body: { reason: ' ' },
    });
    expect(problem.errors?.map((e) => e.pointer)).toEqual(['#/reason']);
  });
});

describe('an exposure that does not exist', () => {
  it.each(
    [getExposure, getExposurePicture, getExposurePixels, getExposureThumbnail].map(
      (e) => [e.name, e] as const,
    ),
  )('is not found by %s', async (_, endpoint) => {
    for (const exposureId of [noSuchId, 'x'])
      await analyst.refused(endpoint, 'not-found-or-not-yours', { params: { exposureId } });
  });
});
