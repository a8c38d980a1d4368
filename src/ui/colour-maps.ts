import type { Theme } from '#src/lib/theme.ts';

/** RGB triples for the codes 0 … 255. */
export type ColourMap = Uint8ClampedArray;

export type ColourMapName = 'magma' | 'safelight' | 'grey';

type Triple = readonly [number, number, number];

/** Hues along the way from dark to bright (sRGB); their lightness is replaced, so only hue and chroma matter. */
const anchors: Record<ColourMapName, readonly Triple[]> = {
  magma: [
    [0, 0, 4],
    [24, 15, 62],
    [69, 16, 119],
    [114, 31, 129],
    [159, 47, 127],
    [205, 64, 113],
    [241, 96, 93],
    [253, 150, 104],
    [254, 202, 141],
    [252, 253, 191],
  ],
  safelight: [
    [7, 2, 1],
    [46, 12, 6],
    [92, 20, 6],
    [140, 38, 6],
    [184, 66, 4],
    [214, 104, 4],
    [236, 146, 30],
    [250, 190, 92],
    [255, 222, 156],
    [255, 243, 214],
  ],
  grey: [
    [0, 0, 0],
    [255, 255, 255],
  ],
};

const lightness: Record<ColourMapName, readonly [number, number]> = {
  magma: [0.4, 97.5],
  safelight: [1, 95],
  grey: [0, 100],
};

const white: Triple = [0.95047, 1, 1.08883];

function linear(code: number): number {
  const c = code / 255;
  return c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4;
}

function code(value: number): number {
  const c = Math.min(1, Math.max(0, value));
  return Math.round(255 * (c <= 0.0031308 ? 12.92 * c : 1.055 * c ** (1 / 2.4) - 0.055));
}

const f = (t: number) => (t > (6 / 29) ** 3 ? Math.cbrt(t) : t / (3 * (6 / 29) ** 2) + 4 / 29);
const inverse = (t: number) => (t > 6 / 29 ? t ** 3 : 3 * (6 / 29) ** 2 * (t - 4 / 29));

/** CIE 1976 L*a*b* of an sRGB colour, white D65. */
export function labOf([r, g, b]: Triple): Triple {
  const [R, G, B] = [linear(r), linear(g), linear(b)];
  const X = f((0.4124564 * R + 0.3575761 * G + 0.1804375 * B) / white[0]);
  const Y = f(0.2126729 * R + 0.7151522 * G + 0.072175 * B);
  const Z = f((0.0193339 * R + 0.119192 * G + 0.9503041 * B) / white[2]);
  return [116 * Y - 16, 500 * (X - Y), 200 * (Y - Z)];
}

function rgbOf([L, a, b]: Triple): Triple {
  const fy = (L + 16) / 116;
  const X = white[0] * inverse(fy + a / 500);
  const Y = inverse(fy);
  const Z = white[2] * inverse(fy - b / 200);
  return [
    code(3.2404542 * X - 1.5371385 * Y - 0.4985314 * Z),
    code(-0.969266 * X + 1.8760108 * Y + 0.041556 * Z),
    code(0.0556434 * X - 0.2040259 * Y + 1.0572252 * Z),
  ];
}

function build(name: ColourMapName): ColourMap {
  const path = anchors[name].map(labOf);
  const [from, to] = lightness[name];
  const map = new Uint8ClampedArray(256 * 3);
  for (let i = 0; i < 256; i++) {
    const L = from + ((to - from) * i) / 255;
    const next = Math.max(
      1,
      path.findIndex((p) => p[0] >= L),
    );
    const k = path[path.length - 1][0] < L ? path.length - 1 : next;
    const [p, q] = [path[k - 1], path[k]];
    const t = Math.min(1, Math.max(0, (L - p[0]) / (q[0] - p[0])));
    map.set(rgbOf([L, p[1] + t * (q[1] - p[1]), p[2] + t * (q[2] - p[2])]), 3 * i);
  }
  return map;
}

const built = new Map<ColourMapName, ColourMap>();

/** A map whose lightness L* rises evenly with the code, so that equal steps look equal. */
export function colourMap(name: ColourMapName): ColourMap {
  let map = built.get(name);
  if (!map) built.set(name, (map = build(name)));
  return map;
}

/** The map of a theme: magma in daylight, safelight in the darkroom. */
export function colourMapOf(theme: Theme): ColourMap {
  return colourMap(theme === 'darkroom' ? 'safelight' : 'magma');
}
