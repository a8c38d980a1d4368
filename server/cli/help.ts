export const help = `Names the opening behind a photographed laser far-field pattern.

One picture:
  identify PICTURE --wavelength-nm N --distance-mm N --pixel-um N [options]

Many pictures:
  identify --cases cases.jsonl [--out predictions.jsonl] [--threads N]

Set-up of one picture
  --wavelength-nm N       wavelength of the laser
  --distance-mm N         opening to sensor or screen; with --geometry lens the focal length
  --pixel-um N            pixel pitch at the pattern
  --wavelength-u-nm N     standard uncertainties of the three (0 where not given)
  --distance-u-mm N
  --pixel-u-um N
  --geometry WORD         sensor (default), screen or lens
  --encoding WORD         linear (default) or srgb
  --bit-depth N           8, 10, 12, 14 or 16 bits of the camera (default 8)
  --dark-level N          code of a dark pixel, in codes of that bit depth
  --mirrored              the camera sees the pattern reversed

Output
  --json                  data instead of a table (one picture)
  --out FILE              where the answers to many pictures go (default: printed)
  --threads N             pictures worked on at once, 1 to 64 (default: 4 or the processor's own number, if smaller)
  --help                  this text

A laser can blind. Attenuate before a camera, never look into the beam, follow your laser safety officer's rules.
`;
