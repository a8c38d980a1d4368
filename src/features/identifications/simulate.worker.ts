import { familyOf } from '#shared/apertures/registry.ts';
import { simulatePattern } from '#shared/apertures/simulate.ts';
import type { SimulationRequest } from '#src/features/identifications/use-simulation.ts';

self.onmessage = ({ data }: MessageEvent<SimulationRequest>) => {
  const { id, family, model: modelId, width, height, ...pattern } = data;
  const model = familyOf(family).models.find((m) => m.id === modelId);
  if (!model) return self.postMessage({ id, counts: null });
  const counts = simulatePattern({ ...pattern, model }, { left: 0, top: 0, width, height, step: 1 });
  self.postMessage({ id, counts }, { transfer: [counts.buffer] });
};
