import type { ApertureValues } from '#shared/apertures/family.ts';

/**
 * What goes into an identification and what comes out of it. SI throughout: metres, radians; picture coordinates in
 * pixels, x right and y down from the centre of the top-left pixel; angles counter-clockwise as displayed.
 */

/** A picture as decoded: one plane of raw codes, row by row from the top. */
export interface Picture {
  readonly width: number;
  readonly height: number;
  readonly codes: Uint16Array;
  /** Code of a fully exposed pixel (255, 4095·16, 65535 …). */
  readonly fullScale: number;
  /** Step between neighbouring codes: 1, or 16 for 12-bit data stored left-aligned in 16 bits. */
  readonly codeStep: number;
  /** True where the file format has thrown information away (JPEG). */
  readonly lossy: boolean;
}

/** A value and its standard uncertainty. */
export interface Measured {
  readonly value: number;
  readonly u: number;
}

export interface Setup {
  readonly geometry: 'sensor' | 'screen' | 'lens';
  readonly wavelength: Measured;
  /** Distance to the pattern, or the focal length for `lens`. */
  readonly distance: Measured;
  /** Pixel pitch at the pattern. */
  readonly pixelPitch: Measured;
  readonly encoding: 'linear' | 'srgb';
  /** In codes of the picture (already scaled to `codes`), or null when it is not known. */
  readonly darkLevel: number | null;
  /** True where the camera sees the pattern reversed. */
  readonly mirrored: boolean;
}

export interface CandidateDimension {
  readonly value: number | null;
  /** Standard uncertainty from image noise, from the set-up, and both combined. */
  readonly uImage: number;
  readonly uSetup: number;
  readonly u: number;
  /** Set where the picture only bounds the value. */
  readonly bound: 'at-least' | 'at-most' | null;
}

export interface Candidate {
  readonly family: string;
  readonly model: string;
  readonly values: ApertureValues;
  readonly dimensions: Readonly<Record<string, CandidateDimension>>;
  /** Direction of the family's axis in the displayed picture, radians in [0, period); null for round shapes. */
  readonly orientation: Measured | null;
  readonly orientationPeriod: number | null;
  /** 0 … 1; the candidates of an outcome and "none of these" share 1. */
  readonly probability: number;
  readonly reducedChiSquare: number;
  /** Everything needed to draw the simulated picture: fitted values of `model` and the nuisances. */
  readonly fit: {
    readonly values: readonly number[];
    readonly center: { readonly x: number; readonly y: number };
    readonly amplitude: number;
    /** Offset in linear counts at the centre, slope per pixel to the right and downwards. */
    readonly background: { readonly offset: number; readonly slopeX: number; readonly slopeY: number };
    /** Variance of the blur in px² beyond the pixel's own. */
    readonly blurVariance: number;
  };
}

/** What the picture cannot say; the words for each are chosen where people read them. */
export type Verdict = 'identified' | 'ambiguous' | 'unidentified';

export type Untold =
  | 'half-turn-twin'
  | 'complement'
  | 'scale'
  | 'place'
  | 'unresolved-length'
  | 'bounded-dimension'
  | 'near-field'
  | 'undersampled'
  | 'unknown-response';

export type UnusableReason =
  | 'no-contrast'
  | 'all-dark'
  | 'all-saturated'
  | 'mostly-saturated'
  | 'no-center'
  | 'too-few-pixels'
  | 'fringes-undersampled'
  | 'no-minimum-in-frame';

export interface PictureFacts {
  /** Shares of all pixels, 0 … 1. */
  readonly saturatedShare: number;
  readonly maskedShare: number;
  /** Centre of point symmetry, standard uncertainty in px; null when none was found. */
  readonly center: { readonly x: number; readonly y: number; readonly u: number } | null;
  /** Variance law in linear counts: a + b·I + c·I². */
  readonly noise: { readonly a: number; readonly b: number; readonly c: number } | null;
}

export interface FarFieldFinding {
  readonly holds: boolean;
  /** a²/(λL) from the best candidate's half extent; 0 in the focal plane of a lens, null when no size is known. */
  readonly fresnelNumber: number | null;
  /** Distance at which the Fresnel number would be 0.1, metres; null for a lens or no size. */
  readonly distanceNeeded: number | null;
}

export type Outcome =
  | {
      readonly kind: 'answer';
      readonly verdict: Verdict;
      /** Best first; at least one unless unidentified. */
      readonly candidates: readonly Candidate[];
      readonly untold: readonly Untold[];
      readonly farField: FarFieldFinding;
      readonly picture: PictureFacts;
    }
  | {
      readonly kind: 'unusable';
      readonly reasons: readonly UnusableReason[];
      readonly picture: PictureFacts;
    };

/** Told while it runs: what is being done, and the share done from 0 to 1, never falling. */
export type Progress = (step: string, share: number) => void;
