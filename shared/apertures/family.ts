/**
 * What an aperture family has to give. All lengths in metres, spatial frequencies in cycles per metre, angles in
 * radians counter-clockwise; the aperture's own frame has u along the axis whose direction is reported.
 */

/** One number that describes a member of a family. */
export interface Parameter {
  readonly key: string;
  readonly label: string;
  /** `length` in metres, `count` a whole number. */
  readonly kind: 'length' | 'count';
  /** Smallest and largest value that the engine and the forms accept. */
  readonly min: number;
  readonly max: number;
  /** True where the picture may leave the value open: it is then `null` ("not resolved"). */
  readonly nullable?: boolean;
}

/** Values of a family's parameters, by key; `null` only where the parameter is nullable. */
export type ApertureValues = Readonly<Record<string, number | null>>;

/** A shape, without place or direction. */
export interface Aperture {
  readonly family: string;
  readonly values: ApertureValues;
}

/** A closed ring of points [x, y] in metres, counter-clockwise for openings, clockwise for opaque islands. */
export type Ring = readonly (readonly [number, number])[];

/**
 * One closed form of a family's far field. Most families have one; families with a length that may be unresolved
 * have a second one in which the light, not the opening, ends the pattern along u.
 */
export interface FarFieldModel {
  readonly id: string;
  /** Keys of the fitted numbers, in the order of `values`. Keys that are no parameter of the family are nuisances. */
  readonly keys: readonly string[];
  /**
   * Writes the normalised intensity (1 on the axis) at `n` spatial frequencies (u[i], v[i]) into `out`.
   * Allocates nothing. Throws nothing; a frequency of zero is allowed.
   */
  intensity(values: ArrayLike<number>, u: Float64Array, v: Float64Array, out: Float64Array, n: number): void;
  /** Family values from fitted values, and fitted values from family values (nuisances get a stated start). */
  toFamily(values: ArrayLike<number>): ApertureValues;
  fromFamily(values: ApertureValues): number[];
}

/** A unit member for the atlas: fitted values of one model, overall extent of order 1. */
export interface UnitShape {
  readonly model: string;
  readonly values: readonly number[];
}

/** Another family as a limit of this one: where both fit, the simpler one is preferred. */
export interface Kinship {
  readonly family: string;
  /** Start values for the kin's model `model` from this family's values, or null where there is none. */
  readonly model: string;
  start(values: ApertureValues): { values: number[]; turn: number } | null;
}

export interface ApertureFamily {
  readonly id: string;
  readonly label: string;
  readonly parameters: readonly Parameter[];
  /** Turn that leaves the *intensity* unchanged, in radians; null for round shapes. */
  readonly rotationPeriod: number | null;
  /** What the reported orientation is the direction of ("long axis"), or null for round shapes. */
  readonly axis: string | null;
  readonly models: readonly FarFieldModel[];
  /** True where the first two sizes are the same kind of size along two axes, the longer one first. */
  readonly longAxisFirst?: boolean;
  /** Number of degrees of freedom of shape: the measure of "simpler". */
  readonly complexity: number;
  /** Open area in m²; null where a length is not resolved. */
  area(values: ApertureValues): number | null;
  /** Signed distance to the edge in metres at (x, y), negative inside the opening. Unresolved lengths are endless. */
  distance(values: ApertureValues, x: number, y: number): number;
  /** Outline as rings for drawings; unresolved lengths are drawn to `extent` metres. */
  outline(values: ApertureValues, extent: number): readonly Ring[];
  /** Largest extent in metres (half of it enters the Fresnel number); unresolved lengths are left out. */
  extent(values: ApertureValues): number;
  /** True when the values are a proper member: not a degenerate one that belongs to a simpler family. */
  proper(values: ApertureValues): boolean;
  readonly unitShapes: readonly UnitShape[];
  readonly kin: readonly Kinship[];
  /** At least three members of everyday size, for tests, demo data and forms. */
  readonly examples: readonly ApertureValues[];
}

/** Checks a family's own promises at load time and returns it. */
export function defineFamily(family: ApertureFamily): ApertureFamily {
  const keys = new Set(family.parameters.map((p) => p.key));
  if (keys.size !== family.parameters.length) throw new Error(`${family.id}: a parameter is named twice`);
  if ((family.rotationPeriod === null) !== (family.axis === null))
    throw new Error(`${family.id}: an axis and a period go together`);
  return family;
}
