import type { UnusableReason } from '#shared/contracts/identifications.ts';

/** What is wrong with the picture, what that does, and the mend. */
export const unusableSentences: Record<UnusableReason, string> = {
  'all-dark':
    'The picture is black: no pixel stands out of the noise, so there is no pattern to measure. Check shutter and exposure time and photograph it again.',
  'no-contrast':
    'The picture has no contrast: everything in it is equally bright, so there is no pattern to measure. Darken the room, check the alignment and photograph it again.',
  'all-saturated':
    'The whole picture is saturated, so no intensity is left to measure. Shorten the exposure or attenuate the beam and photograph it again.',
  'mostly-saturated':
    'More than half of the picture is saturated, so too little is left to measure. Shorten the exposure or attenuate the beam and photograph it again.',
  'no-center':
    'No centre was found: the picture is not symmetric about any point, as the far field of an opening is. Bring the central spot into the frame, take away stray light and photograph it again.',
  'too-few-pixels': 'The picture has too few pixels to measure a pattern in. Photograph it with more pixels.',
  'fringes-undersampled':
    'The fringes are finer than 3.5 pixels, so their contrast is lost. Move the camera farther away or use a longer lens and photograph it again.',
  'no-minimum-in-frame':
    'Not a single dark fringe lies in the frame, so no size can be measured. Bring the camera nearer or use a shorter lens, so that more of the pattern is in the frame, and photograph it again.',
};
