import { describe, expect, it } from 'vitest';
import { decodePicture } from '#server/images/decode.ts';
import { setupOf } from '#server/images/setup-of.ts';
import type { BenchValues } from '#shared/contracts/benches.ts';
import { bmpFile, interleaved, jpegFile, withOrientation } from '#tests/support/bitmap-files.ts';
import { badPictures } from '#tests/support/bad-pictures.ts';
import { pngFile } from '#tests/support/png-files.ts';
import { tiffFile } from '#tests/support/tiff-files.ts';
import { colours, laserPicture } from '#tests/support/two-lasers.ts';

const width = 48;
const height = 40;
const n = width * height;
/** Every code differs from its neighbours, so that a lost bit or a moved pixel shows. */
const deep = Uint16Array.from({ length: n }, (_, i) => (i * 40503 + 12345) % 65536);
const flat = Uint8Array.from({ length: n }, (_, i) => (i * 167 + 31) % 256);

const codesOf = async (bytes: Buffer, name: string, benchDepth = 16) =>
  Array.from((await decodePicture(bytes, name, benchDepth)).codes);

describe('a picture of 16 bits keeps every bit', () => {
  it.each([
    ['PNG', () => pngFile({ width, height, data: deep }), 'a.png'],
    ['TIFF, little endian', () => tiffFile({ width, height, data: deep }), 'a.tif'],
    ['TIFF, big endian', () => tiffFile({ width, height, data: deep, bigEndian: true }), 'a.tiff'],
    ['TIFF in strips', () => tiffFile({ width, height, data: deep, rowsPerStrip: 7 }), 'a.tif'],
    ['packed TIFF', () => tiffFile({ width, height, data: deep, rowsPerStrip: 7, packed: true }), 'a.tif'],
  ])('%s', async (_, file, name) => {
    const picture = await decodePicture(file(), name, 16);
    expect(Array.from(picture.codes)).toEqual(Array.from(deep));
    expect(picture).toMatchObject({
      width,
      height,
      bitDepth: 16,
      fullScale: 65535,
      codeStep: 1,
      lossy: false,
    });
  });
});

describe('a picture of 8 bits', () => {
  it.each([
    ['PNG', () => pngFile({ width, height, data: flat }), 'a.PNG', 'png'],
    ['TIFF', () => tiffFile({ width, height, data: flat }), 'a.tif', 'tiff'],
    ['BMP of 24 bits', () => bmpFile({ width, height, data: interleaved(flat) }), 'a.bmp', 'bmp'],
    ['BMP from the top', () => bmpFile({ width, height, data: interleaved(flat) }, 24, true), 'a.bmp', 'bmp'],
    ['BMP of 8 bits', () => bmpFile({ width, height, data: interleaved(flat) }, 8), 'a.bmp', 'bmp'],
    ['PNG with an alpha channel that hides nothing', () => opaque(), 'a.png', 'png'],
  ])('%s gives its codes', async (_, file, name, format) => {
    const picture = await decodePicture(file(), name, 8);
    expect(Array.from(picture.codes)).toEqual(Array.from(flat));
    expect(picture).toMatchObject({ format, channel: 'grey', bitDepth: 8, fullScale: 255, codeStep: 1 });
  });

  function opaque(): Buffer {
    const data = new Uint8Array(2 * n).map((_, i) => (i % 2 === 0 ? flat[i / 2] : 255));
    return pngFile({ width, height, data, channels: 2 });
  }

  it('counts from black where a TIFF counts from white (TIFF 6.0, photometric interpretation 0)', async () => {
    const file = tiffFile({ width, height, data: flat.map((code) => 255 - code), tags: { 262: 0 } });
    expect(await codesOf(file, 'a.tif')).toEqual(Array.from(flat));
  });

  it('as JPEG is lossy and close to its codes', async () => {
    const smooth = Uint8Array.from({ length: n }, (_, i) => 40 + 3 * (i % width) + Math.floor(i / width));
    const file = await jpegFile({ width, height, data: interleaved(smooth) }, 98);
    const picture = await decodePicture(file, 'a.jpg', 8);
    expect(picture).toMatchObject({ format: 'jpeg', channel: 'grey', lossy: true, bitDepth: 8 });
    picture.codes.forEach((code, i) => expect(Math.abs(code - smooth[i])).toBeLessThan(6));
  });

  it('as JPEG stands as a viewer shows it, turned by its orientation tag', async () => {
    const corner = Uint8Array.from({ length: n }, (_, i) => (i % width < 16 && i < 16 * width ? 240 : 10));
    const lying = await jpegFile({ width, height, data: interleaved(corner) });
    // 6: the first row is the right-hand side, so the bright corner at the top left comes to the top right.
    const picture = await decodePicture(withOrientation(lying, 6), 'a.jpg', 8);
    expect([picture.width, picture.height]).toEqual([height, width]);
    const at = (x: number, y: number) => picture.codes[y * height + x];
    expect(at(height - 8, 8)).toBeGreaterThan(220);
    expect(at(8, 8)).toBeLessThan(30);
    expect(at(height - 8, width - 8)).toBeLessThan(30);
  });
});

describe('fewer bits in a file of 16', () => {
  const twelve = deep.map((code) => code >> 4);

  it('left-aligned codes are found from the data, whatever the bench says', async () => {
    const left = pngFile({ width, height, data: twelve.map((code) => code << 4) });
    for (const bench of [8, 12, 16])
      expect(await decodePicture(left, 'a.png', bench)).toMatchObject({
        bitDepth: 12,
        fullScale: 65520,
        codeStep: 16,
      });
  });

  it('left-aligned codes are found in a dim picture too', async () => {
    const dim = pngFile({ width, height, data: twelve.map((code) => (code >> 6) << 4) });
    expect(await decodePicture(dim, 'a.png', 12)).toMatchObject({ fullScale: 65520, codeStep: 16 });
  });

  it('a picture of one code is read by the bench', async () => {
    const white = pngFile({ width, height, data: new Uint16Array(n).fill(4095 << 4) });
    expect(await decodePicture(white, 'a.png', 12)).toMatchObject({ fullScale: 65520, codeStep: 16 });
    const black = pngFile({ width, height, data: new Uint16Array(n) });
    expect(await decodePicture(black, 'a.png', 12)).toMatchObject({ fullScale: 4095, codeStep: 1 });
  });

  it('codes stretched to 16 bits are found from the data', async () => {
    const stretched = pngFile({ width, height, data: Uint16Array.from(flat, (code) => code * 257) });
    expect(await decodePicture(stretched, 'a.png', 16)).toMatchObject({
      bitDepth: 8,
      fullScale: 65535,
      codeStep: 257,
    });
    const wide = pngFile({ width, height, data: twelve.map((code) => (code << 4) | (code >> 8)) });
    expect(await decodePicture(wide, 'a.png', 16)).toMatchObject({ bitDepth: 12, fullScale: 65535 });
  });

  it.each([10, 12, 14] as const)('right-aligned %i bits are told by the bench', async (bits) => {
    const right = tiffFile({ width, height, data: deep.map((code) => code >> (16 - bits)) });
    const scale = { bitDepth: bits, fullScale: 2 ** bits - 1, codeStep: 1 };
    expect(await decodePicture(right, 'a.tif', bits)).toMatchObject(scale);
  });

  it('a bench of fewer bits than the file uses does not clip it', async () => {
    const picture = await decodePicture(pngFile({ width, height, data: deep }), 'a.png', 12);
    expect(picture).toMatchObject({ bitDepth: 16, fullScale: 65535 });
  });

  it("the bench's dark level is in codes of the camera and reaches the engine in codes of the file", async () => {
    const bench: BenchValues = {
      geometry: 'sensor',
      wavelength: { value: 632.8e-9, u: 0 },
      distance: { value: 0.5, u: 0 },
      pixelPitch: { value: 5e-6, u: 0 },
      encoding: 'linear',
      bitDepth: 12,
      darkLevel: 64,
      mirrored: false,
    };
    const left = await decodePicture(
      pngFile({ width, height, data: twelve.map((code) => code << 4) }),
      'a.png',
      12,
    );
    expect(setupOf(bench, left).darkLevel).toBeCloseTo(64 * 16, 9);
    const right = await decodePicture(pngFile({ width, height, data: twelve }), 'a.png', 12);
    expect(setupOf(bench, right).darkLevel).toBeCloseTo(64, 9);
    expect(setupOf({ ...bench, darkLevel: null }, right).darkLevel).toBeNull();
  });
});

describe('a colour picture of one laser', () => {
  it.each([
    ['within full scale', 0.8],
    ['with a clipped core', 8],
  ])('gives the plane of the channel that carries it, %s', async (_, peak) => {
    const data = colours(peak, 0.1, 0);
    const picture = await decodePicture(pngFile({ ...laserPicture, data, channels: 3 }), 'a.png', 8);
    expect(picture.channel).toBe('red');
    expect(Array.from(picture.codes)).toEqual(Array.from(data.filter((_code, i) => i % 3 === 0)));
  });

  it('is not taken for two, also through a JPEG with coloured room light', async () => {
    const data = colours(3, 0.2, 0).map((code, i) => Math.min(255, code + (i % 3 === 1 ? 18 : 9)));
    const picture = await decodePicture(await jpegFile({ ...laserPicture, data }, 80), 'a.jpg', 8);
    expect(picture.channel).toBe('red');
  });
});

describe('a file that cannot be measured', () => {
  it.each(badPictures.map((bad) => [bad.what, bad] as const))('%s is refused', async (_, bad) => {
    const attempt = decodePicture(await bad.file(), bad.name, 16);
    await expect(attempt).rejects.toMatchObject({ code: bad.code, message: expect.stringMatching(bad.says) });
  });
});

describe('a name', () => {
  it.each(['pattern', 'L=0.85', 'PATTERN.PNG', 'run.3.png'])(
    'such as %s says nothing wrong',
    async (name) => {
      expect(await codesOf(pngFile({ width, height, data: deep }), name)).toEqual(Array.from(deep));
    },
  );
});
