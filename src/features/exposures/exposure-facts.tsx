import { FactList } from '#src/ui/fact-list.tsx';
import { printQuantity } from '#shared/quantities.ts';
import type { Exposure } from '#shared/contracts/exposures.ts';

/** "0.3 %", "under 0.01 %", "none" */
export function printShare(share: number): string {
  if (share <= 0) return 'none';
  const percent = 100 * share;
  return percent < 0.01
    ? 'under 0.01\u00a0%'
    : `${percent < 1 ? percent.toPrecision(2) : percent.toFixed(1)}\u00a0%`;
}

/** What is known of an exposure at once, before any identification. */
export function ExposureFacts({ exposure: e }: { exposure: Exposure }) {
  const { center } = e.facts;
  const far = e.farFieldForDrawing;
  const channel = e.channel === 'grey' ? '' : `, ${e.channel} channel`;
  return (
    <FactList
      facts={[
        { name: 'Size', value: `${e.width} by ${e.height} px` },
        { name: 'Depth', value: `${e.bitDepth} bit, ${e.format.toUpperCase()}${channel}` },
        { name: 'Saturated', value: printShare(e.facts.saturatedShare) },
        {
          name: 'Centre found',
          value: center ? `${center.x.toFixed(1)}, ${center.y.toFixed(1)} px` : 'not found',
        },
        ...(far && far.fresnelNumber !== null && e.bench.geometry !== 'lens'
          ? [
              {
                name: 'Fresnel number, drawing',
                value: far.holds
                  ? far.fresnelNumber.toPrecision(2)
                  : `${far.fresnelNumber.toPrecision(2)}, near field${far.distanceNeeded === null ? '' : `: needs ${printQuantity(far.distanceNeeded, 'mm', 3)}`}`,
              },
            ]
          : []),
      ]}
    />
  );
}
