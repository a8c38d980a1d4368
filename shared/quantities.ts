/**
 * Where SI meets people: the only powers of ten for display and entry. Inside, every length is in metres and every angle
 * in radians.
 */

export const units = {
  nm: { factor: 1e-9, label: 'nm' },
  um: { factor: 1e-6, label: 'µm' },
  mm: { factor: 1e-3, label: 'mm' },
  deg: { factor: Math.PI / 180, label: '°' },
} as const;
export type Unit = keyof typeof units;

const nbsp = '\u00a0';

/** A number in `unit` from SI, free of the dust of binary fractions (632.8, not 632.8000000000001). */
export function fromSi(value: number, unit: Unit): number {
  return Number((value / units[unit].factor).toPrecision(12));
}

/** SI from a number in `unit`. */
export function toSi(value: number, unit: Unit): number {
  return Number((value * units[unit].factor).toPrecision(15));
}

/** Decimals that show two significant figures of an expanded uncertainty; none above 100. */
export function decimalsFor(expanded: number): number {
  if (!(expanded > 0) || !Number.isFinite(expanded)) return 2;
  return Math.min(6, Math.max(0, 1 - Math.floor(Math.log10(expanded))));
}

/** Thin groups of three above 9 999. */
export function grouped(text: string): string {
  const [whole, fraction] = text.split('.') as [string, string | undefined];
  const digits = whole.replace(/^-/, '');
  const spaced = digits.length > 4 ? digits.replace(/\B(?=(\d{3})+$)/g, '\u202f') : digits;
  return (whole.startsWith('-') ? '\u2212' : '') + spaced + (fraction === undefined ? '' : '.' + fraction);
}

/** Value and expanded uncertainty U = 2u (k = 2) as printed parts, both rounded to two significant figures of U. */
export function printParts(
  value: number,
  u: number,
  unit: Unit,
): { value: string; expanded: string; unit: string } {
  const expanded = (2 * u) / units[unit].factor;
  const decimals = decimalsFor(expanded);
  return {
    value: grouped((value / units[unit].factor).toFixed(decimals)),
    expanded: grouped(expanded.toFixed(decimals)),
    unit: units[unit].label,
  };
}

/** "212.40 ± 0.71 µm"; U is expanded, k = 2. */
export function printMeasured(value: number, u: number, unit: Unit): string {
  const p = printParts(value, u, unit);
  const gap = unit === 'deg' ? '' : nbsp;
  return unit === 'deg'
    ? `${p.value}°${nbsp}±${nbsp}${p.expanded}°`
    : `${p.value}${nbsp}±${nbsp}${p.expanded}${gap}${p.unit}`;
}

/** A plain quantity with the given number of significant figures. */
export function printQuantity(value: number, unit: Unit, figures = 4): string {
  const number = Number((value / units[unit].factor).toPrecision(figures));
  return unit === 'deg'
    ? `${grouped(String(number))}°`
    : `${grouped(String(number))}${nbsp}${units[unit].label}`;
}

/** Reads what a person typed: a number with point or comma, or null. */
export function parseNumber(text: string): number | null {
  const cleaned = text
    .trim()
    .replace(/[\s\u202f\u00a0]/g, '')
    .replace('\u2212', '-')
    .replace(',', '.');
  if (!/^-?(\d+\.?\d*|\.\d+)(e-?\d+)?$/i.test(cleaned)) return null;
  const value = Number(cleaned);
  return Number.isFinite(value) ? value : null;
}
