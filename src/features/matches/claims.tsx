import type { ReactNode } from 'react';
import { familyOf } from '#shared/apertures/registry.ts';
import type { Candidate, FarFieldFinding } from '#shared/contracts/identifications.ts';
import { printQuantity } from '#shared/quantities.ts';
import { Measured } from '#src/ui/measured.tsx';
import { printProbability } from '#src/ui/print-probability.ts';

interface ClaimsProps {
  candidate: Candidate;
  farField: FarFieldFinding;
  /** The next candidate of the same identification. */
  runnerUp: Candidate | undefined;
}

/** Claim by claim what the match says, beside what the next candidate would say. */
export function Claims({ candidate, farField, runnerUp }: ClaimsProps) {
  const family = familyOf(candidate.family);
  const other = runnerUp && familyOf(runnerUp.family);
  const rows: { name: string; claim: ReactNode; next: ReactNode }[] = [
    {
      name: 'Shape',
      claim: family.label,
      next:
        other && runnerUp
          ? `${other.label}, chi-square ${runnerUp.reducedChiSquare.toPrecision(3)}`
          : 'none in play',
    },
    ...family.parameters.map((p) => ({
      name: p.label,
      claim: <Size candidate={candidate} parameter={p.key} />,
      next:
        runnerUp && other?.parameters.some((q) => q.key === p.key) ? (
          <Size candidate={runnerUp} parameter={p.key} />
        ) : (
          ''
        ),
    })),
    ...(candidate.orientation
      ? [
          {
            name: `Orientation, ${family.axis}`,
            claim: (
              <>
                <Measured value={candidate.orientation.value} u={candidate.orientation.u} unit="deg" />,
                repeats every {printQuantity(candidate.orientationPeriod ?? 0, 'deg', 3)}
              </>
            ),
            next: runnerUp?.orientation ? (
              <Measured value={runnerUp.orientation.value} u={runnerUp.orientation.u} unit="deg" />
            ) : (
              ''
            ),
          },
        ]
      : []),
    {
      name: 'Centre',
      claim: `${candidate.fit.center.x.toFixed(1)}, ${candidate.fit.center.y.toFixed(1)} px`,
      next: runnerUp ? `${runnerUp.fit.center.x.toFixed(1)}, ${runnerUp.fit.center.y.toFixed(1)} px` : '',
    },
    {
      name: 'Far field',
      claim: farField.holds
        ? `holds${farField.fresnelNumber ? `, Fresnel number ${farField.fresnelNumber.toPrecision(2)}, limit 0.1` : ''}`
        : `does not hold, Fresnel number ${farField.fresnelNumber?.toPrecision(2) ?? 'not known'}, limit 0.1`,
      next: '',
    },
    {
      name: 'Fit',
      claim: `reduced chi-square ${candidate.reducedChiSquare.toPrecision(3)}, probability ${printProbability(candidate.probability)}`,
      next: runnerUp ? `probability ${printProbability(runnerUp.probability)}` : '',
    },
  ];
  return (
    <div tabIndex={0} role="region" aria-label="Claims beside the runner-up" className="overflow-x-auto">
      <table className="w-full border-collapse text-left">
        <caption className="sr-only">Claims of the match beside the runner-up</caption>
        <thead>
          <tr className="label text-ink3">
            <th scope="col" className="pb-1.5">
              Claim
            </th>
            <th scope="col" className="pb-1.5">
              This match, U with k = 2
            </th>
            <th scope="col" className="pb-1.5">
              Runner-up
            </th>
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr key={row.name} className="border-t border-rule">
              <th scope="row" className="py-2.5 pr-4 align-top font-[500] text-ink2">
                {row.name}
              </th>
              <td className="reading py-2.5 pr-4 align-top">{row.claim}</td>
              <td className="py-2.5 align-top text-ink2">{row.next}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

function Size({ candidate, parameter }: { candidate: Candidate; parameter: string }) {
  const d = candidate.dimensions[parameter];
  if (!d || d.value === null) return <>not resolved</>;
  if (d.bound)
    return <>{`${d.bound === 'at-least' ? 'at least' : 'at most'} ${printQuantity(d.value, 'um', 3)}`}</>;
  return <Measured value={d.value} u={d.u} unit="um" />;
}
