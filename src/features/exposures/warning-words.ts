import type { ExposureWarning } from '#shared/contracts/exposures.ts';

/** What stands out about an exposure: cause first, then what it does and what mends it. */
export const warningWords: Record<ExposureWarning, { lead: string; rest: string }> = {
  'saturated-core': {
    lead: 'The core is saturated.',
    rest: 'These pixels are left out of the fit. A shorter exposure beside this one shows the core.',
  },
  'lossy-file': {
    lead: 'Compressed with loss.',
    rest: 'Weak fringes carry marks of the compression; the uncertainties are larger. Export PNG or TIFF.',
  },
  'eight-bit': {
    lead: 'Eight bits only.',
    rest: 'Weak fringes sink below one code. Save 12 or 16 bit if the camera can.',
  },
  'unknown-dark-level': {
    lead: 'The bench states no dark level.',
    rest: 'It is estimated from the picture’s rim. Enter it at the bench from a covered frame.',
  },
  'center-near-edge': {
    lead: 'The centre lies near the edge.',
    rest: 'One side of the pattern is cut off. Centre the spot and expose again.',
  },
  'near-field-for-drawing': {
    lead: 'Near field for the size on the drawing.',
    rest: 'Sizes can’t be trusted at this distance. Move the sensor back or use a lens.',
  },
  'drawing-undersampled': {
    lead: 'Too few pixels for the fringes of the size on the drawing.',
    rest: 'Go farther back or take finer pixels.',
  },
  'depth-below-bench': {
    lead: 'The file holds fewer bits than the bench’s camera delivers.',
    rest: 'The export has thrown levels away. Save the camera’s full depth.',
  },
};
