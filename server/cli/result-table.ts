import type { Candidate, Outcome } from '#server/engine/outcome.ts';
import { unusableSentences } from '#server/images/unusable-sentences.ts';
import { familyOf } from '#shared/apertures/registry.ts';
import { printMeasured } from '#shared/quantities.ts';

const verdictSentences = {
  identified: 'identified',
  ambiguous: 'ambiguous: the picture does not part the first candidates',
  unidentified: 'not identified: no family of the catalogue explains the picture',
} as const;

/** An outcome for a person to read; uncertainties expanded, k = 2. */
export function resultTable(outcome: Outcome): string {
  if (outcome.kind === 'unusable')
    return ['Nothing can be identified in this picture.', ...outcome.reasons.map((r) => unusableSentences[r])]
      .join('\n')
      .concat('\n');
  const { center, saturatedShare } = outcome.picture;
  const lines = [
    `Verdict     ${verdictSentences[outcome.verdict]}`,
    `Far field   ${farFieldSentence(outcome.farField)}`,
    `Centre      ${center ? `${center.x.toFixed(2)} px from the left, ${center.y.toFixed(2)} px from the top` : 'not found'}`,
    `Saturated   ${(100 * saturatedShare).toFixed(1)} % of the pixels`,
  ];
  if (outcome.candidates.length > 0) lines.push('', 'Candidates, best first (± expanded uncertainty, k = 2)');
  for (const candidate of outcome.candidates) lines.push(...candidateLines(candidate));
  return `${lines.join('\n')}\n`;
}

function farFieldSentence(finding: Extract<Outcome, { kind: 'answer' }>['farField']): string {
  const n = finding.fresnelNumber;
  const number = n === null ? '' : ` (Fresnel number ${n.toPrecision(2)})`;
  if (finding.holds) return `holds${number}`;
  const far = finding.distanceNeeded;
  const mend = far === null ? '' : `; it would from ${Math.ceil(far * 1000)} mm on`;
  return `does not hold${number}${mend}: dimensions are not to be relied on`;
}

function candidateLines(candidate: Candidate): string[] {
  const family = familyOf(candidate.family);
  const rows: [string, string][] = family.parameters.map(({ key, label, kind }) => {
    const d = candidate.dimensions[key];
    if (d.value === null) return [label, 'not resolved'];
    if (kind === 'count') return [label, String(d.value)];
    if (d.bound)
      return [
        label,
        `${d.bound === 'at-least' ? 'at least' : 'at most'} ${printMeasured(d.value, d.u, 'um')}`,
      ];
    return [label, printMeasured(d.value, d.u, 'um')];
  });
  if (candidate.orientation)
    rows.push([
      `Direction of the ${family.axis}`,
      printMeasured(candidate.orientation.value, candidate.orientation.u, 'deg'),
    ]);
  const share = `${(100 * candidate.probability).toFixed(1)} %`.padStart(8);
  return [
    `  ${family.label.padEnd(16)}${share}   reduced chi-square ${candidate.reducedChiSquare.toPrecision(3)}`,
    ...rows.map(([label, value]) => `      ${label.padEnd(38)}${value}`),
  ];
}
