interface SeamSliderProps {
  /** Radians counter-clockwise. */
  seam: number;
  onSeam: (seam: number) => void;
}

/** The seam's direction by keys or pointer: what dragging with shift does on the pattern. */
export function SeamSlider({ seam, onSeam }: SeamSliderProps) {
  const degrees = ((Math.round((seam * 180) / Math.PI) % 360) + 360) % 360;
  return (
    <label className="label mt-2 flex items-center gap-3 text-ink2">
      Seam at {degrees}°
      <input
        type="range"
        min={0}
        max={359}
        step={1}
        value={degrees}
        aria-valuetext={`${degrees} degrees`}
        className="h-6 w-60 accent-seam"
        onChange={(event) => onSeam((Number(event.target.value) * Math.PI) / 180)}
      />
    </label>
  );
}
