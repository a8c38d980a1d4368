import { useEffect, useRef, useState } from 'react';
import type { SimulatedPattern } from '#shared/apertures/simulate.ts';
import type { Candidate } from '#shared/contracts/identifications.ts';
import type { Exposure } from '#shared/contracts/exposures.ts';
import type { Plane } from '#src/ui/pattern/counts.ts';

export type SimulationRequest = Omit<SimulatedPattern, 'model'> & {
  readonly id: number;
  readonly family: string;
  readonly model: string;
  readonly width: number;
  readonly height: number;
};

/**
 * The picture that a candidate would make on an exposure's own pixels, computed beside the page by the same optics as the
 * engine's. The last one stays until the next is ready, so that a change of candidate does not flicker.
 */
export function useSimulation(
  exposure: Exposure,
  candidate: Candidate | undefined,
): { plane: Plane | null; of: Candidate | null } {
  const worker = useRef<Worker | null>(null);
  const asked = useRef(0);
  const [answer, setAnswer] = useState<{ plane: Plane; of: Candidate } | null>(null);
  useEffect(
    () => () => {
      worker.current?.terminate();
      worker.current = null;
    },
    [],
  );
  useEffect(() => {
    if (!candidate) return;
    worker.current ??= new Worker(new URL('./simulate.worker.ts', import.meta.url), { type: 'module' });
    const id = ++asked.current;
    worker.current.onmessage = ({ data }: MessageEvent<{ id: number; counts: Float32Array | null }>) => {
      if (data.id !== asked.current || !data.counts) return;
      setAnswer({
        plane: { width: exposure.width, height: exposure.height, counts: data.counts },
        of: candidate,
      });
    };
    worker.current.postMessage(requestFor(exposure, candidate, id));
  }, [exposure, candidate]);
  return candidate && answer ? answer : { plane: null, of: null };
}

function requestFor(exposure: Exposure, candidate: Candidate, id: number): SimulationRequest {
  const { bench, width, height } = exposure;
  const { values, center, amplitude, background, blurVariance } = candidate.fit;
  return {
    id,
    family: candidate.family,
    model: candidate.model,
    values,
    orientation: candidate.orientation?.value ?? 0,
    geometry: {
      kind: bench.geometry,
      wavelength: bench.wavelength.value,
      distance: bench.distance.value,
      pixelPitch: bench.pixelPitch.value,
    },
    center,
    amplitude,
    background,
    blurVariance,
    width,
    height,
  };
}
