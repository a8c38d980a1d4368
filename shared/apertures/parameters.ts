import type { ApertureValues, Parameter } from '#shared/apertures/family.ts';

/** A length that the catalogue accepts: 1 µm (scalar theory ends near 5 to 10 wavelengths) to 20 mm. */
export function length(key: string, label: string, options: { nullable?: boolean } = {}): Parameter {
  return { key, label, kind: 'length', min: 1e-6, max: 20e-3, ...options };
}

/** The value of a parameter that a family never leaves open. Throws where it is missing: a fault, not a refusal. */
export function valueOf(values: ApertureValues, key: string): number {
  const value = values[key];
  if (value === null || value === undefined) throw new Error(`the aperture has no ${key}`);
  return value;
}
