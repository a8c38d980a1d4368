import { doubleSlit } from '#shared/apertures/double-slit.ts';
import { ellipse } from '#shared/apertures/ellipse.ts';
import type { ApertureFamily } from '#shared/apertures/family.ts';
import { pinhole } from '#shared/apertures/pinhole.ts';
import { rectangle } from '#shared/apertures/rectangle.ts';
import { slit } from '#shared/apertures/slit.ts';
import { slot } from '#shared/apertures/slot.ts';
import { square } from '#shared/apertures/square.ts';

/** The one list of families: contract, engine, forms, sketches and tests follow it. */
export const families: readonly ApertureFamily[] = [
  pinhole,
  ellipse,
  square,
  rectangle,
  slit,
  slot,
  doubleSlit,
];

export const familyIds: readonly string[] = families.map((f) => f.id);

const byId = new Map(families.map((f) => [f.id, f]));

/** The family of this id. Throws for an id that no contract lets through. */
export function familyOf(id: string): ApertureFamily {
  const family = byId.get(id);
  if (!family) throw new Error(`no aperture family is called ${id}`);
  return family;
}
