import { Notice } from '#src/ui/notice.tsx';
import { printQuantity } from '#shared/quantities.ts';

/** Stands wherever a laser is set up or an exposure is taken. */
export function LaserCautions({ wavelength, className }: { wavelength?: number | null; className?: string }) {
  const light = wavelength && Number.isFinite(wavelength) ? ` for ${printQuantity(wavelength, 'nm')}` : '';
  return (
    <Notice tone="warn" lead="Laser on the bench." className={className ?? ''}>
      Never look into the beam or a mirror-like reflection. Attenuate before the camera. Know the laser’s
      class (IEC 60825-1) and wear eyewear chosen{light || ' for its wavelength'}. Your local rules and your
      laser safety officer come first.
    </Notice>
  );
}
