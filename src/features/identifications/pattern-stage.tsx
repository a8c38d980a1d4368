import { useCallback, useMemo, useState } from 'react';
import { useKeys } from '#src/lib/keys.ts';
import type { Candidate } from '#shared/contracts/identifications.ts';
import type { Exposure } from '#shared/contracts/exposures.ts';
import { grouped } from '#shared/quantities.ts';
import { Button } from '#src/ui/button.tsx';
import { Choice } from '#src/ui/choice.tsx';
import { ColourBar } from '#src/ui/pattern/colour-bar.tsx';
import { isSaturated, linearCounts, type Plane } from '#src/ui/pattern/counts.ts';
import { PatternCanvas } from '#src/ui/pattern/pattern-canvas.tsx';
import { toneOf, type Scale } from '#src/ui/pattern/tone.ts';
import { usePainted, type Colours } from '#src/ui/pattern/use-painted.ts';
import type { View } from '#src/ui/pattern/view.ts';
import { PointReading } from '#src/features/identifications/point-reading.tsx';
import { ProfilePlot } from '#src/features/identifications/profile-plot.tsx';
import { SeamSlider } from '#src/features/identifications/seam-slider.tsx';
import { useSimulation } from '#src/features/identifications/use-simulation.ts';

interface PatternStageProps {
  exposure: Exposure;
  codes: Uint16Array;
  candidate: Candidate | undefined;
  /** With the profiles along both axes below. */
  profiles?: boolean;
}

type Layout = 'beside' | 'seam';

/** The measured pattern and what the chosen candidate would make: beside each other or joined along the seam. */
export function PatternStage({ exposure, codes, candidate, profiles }: PatternStageProps) {
  const [layout, setLayout] = useState<Layout>('beside');
  const [scale, setScale] = useState<Scale>('log');
  const [colours, setColours] = useState<Colours>('theme');
  const [showMarks, setShowMarks] = useState(true);
  const [view, setView] = useState<View | null>(null);
  const [seam, setSeam] = useState((118 * Math.PI) / 180);
  const [point, setPoint] = useState<{ x: number; y: number } | null>(null);

  const measured = useMemo(() => linearCounts(exposure, codes), [exposure, codes]);
  const simulation = useSimulation(exposure, candidate);
  const black = candidate?.fit.background.offset ?? lowLevel(measured);
  const noise = Math.sqrt(exposure.facts.noise?.a ?? 1);
  const tone = useMemo(() => toneOf(measured.counts, black, noise, scale), [measured, black, noise, scale]);
  const flat = useCallback((i: number) => isSaturated(exposure, codes[i]), [exposure, codes]);
  const left = usePainted(measured, tone, colours, flat);
  const right = usePainted(simulation.plane, tone, colours);

  const center = candidate?.fit.center ?? exposure.facts.center;
  const marks = center
    ? { center, axis: candidate?.orientation?.value ?? null, pixelPitch: exposure.bench.pixelPitch.value }
    : null;
  const turn = (degrees: number) => setSeam((s) => s + (degrees * Math.PI) / 180);
  useKeys([
    { keys: 'v', label: 'beside or seam', run: () => setLayout(layout === 'seam' ? 'beside' : 'seam') },
    { keys: 's', label: 'turn the seam', run: () => turn(1) },
    { keys: 'S', label: 'turn the seam back', quiet: true, run: () => turn(-1) },
    { keys: ']', label: 'turn the seam by 10°', quiet: true, run: () => turn(10) },
    { keys: '[', label: 'turn the seam back by 10°', quiet: true, run: () => turn(-10) },
    { keys: 'a', label: 'axes', run: () => setShowMarks(!showMarks) },
    { keys: 'c', label: 'colours', run: () => setColours(colours === 'theme' ? 'grey' : 'theme') },
    { keys: '0', label: 'whole picture', quiet: true, run: () => setView(null) },
  ]);
  if (!left) return null;
  const shared = { marks, showMarks, view, onView: setView, onPoint: setPoint };
  const joined = layout === 'seam' && right !== null;
  return (
    <section aria-label="Pattern" className="min-w-0">
      <div className="mb-3 flex flex-wrap items-end gap-x-5 gap-y-2">
        {candidate ? (
          <Choice
            label="Comparison"
            options={[
              { value: 'beside', label: 'Beside each other' },
              { value: 'seam', label: 'Along the seam' },
            ]}
            value={layout}
            onChoose={setLayout}
          />
        ) : null}
        <Choice
          label="Intensity scale"
          options={[
            { value: 'log', label: 'Log' },
            { value: 'root', label: 'Root' },
            { value: 'linear', label: 'Linear' },
          ]}
          value={scale}
          onChoose={setScale}
        />
        <Button small onClick={() => setView(null)} keyHint="0">
          Whole picture
        </Button>
        <ColourBar
          colours={colours}
          from={tone.scale === 'log' ? tone.floor : 0}
          to={tone.peak}
          scale={tone.scale}
        />
      </div>
      {joined ? (
        <>
          <PatternCanvas
            {...shared}
            label={`Measured pattern and ${nameOf(candidate)}, joined along the seam`}
            picture={left}
            beyond={{ picture: right, seam }}
            onSeam={setSeam}
          />
          <SeamSlider seam={seam} onSeam={setSeam} />
        </>
      ) : (
        <div className="grid gap-4 md:grid-cols-2">
          <PatternCanvas {...shared} label="Measured pattern" picture={left} />
          {candidate ? (
            right ? (
              <PatternCanvas {...shared} label={`Simulated: ${nameOf(candidate)}`} picture={right} />
            ) : (
              <p className="label flex aspect-[4/3] items-center justify-center bg-sheet text-ink2">
                Computing the simulated pattern
              </p>
            )
          ) : null}
        </div>
      )}
      <PointReading
        exposure={exposure}
        measured={measured}
        model={simulation.plane}
        center={center}
        point={point}
      />
      <p className="label flex flex-wrap gap-x-5 text-ink3">
        <span>
          <span aria-hidden="true" className="mr-1.5 inline-block size-2.5 bg-sat outline outline-edge" />
          saturated pixels are flat and left out of the fit
        </span>
        <span>drag or arrow keys move, wheel or + and − zoom; with shift a drag turns the seam</span>
        <span>peak {grouped(tone.peak.toFixed(0))} counts above background</span>
      </p>
      {profiles && candidate && center ? (
        <div className="mt-5 grid gap-6 md:grid-cols-2">
          {axesOf(candidate).map(({ title, angle }) => (
            <ProfilePlot
              key={title}
              title={title}
              measured={measured}
              model={simulation.plane}
              center={center}
              angle={angle}
              black={black}
              noise={noise}
              pixelPitch={exposure.bench.pixelPitch.value}
            />
          ))}
        </div>
      ) : null}
    </section>
  );
}

const nameOf = (candidate: Candidate | undefined) =>
  candidate?.family.replace(/([A-Z])/g, ' $1').toLowerCase() ?? '';

function axesOf(candidate: Candidate): { title: string; angle: number }[] {
  const angle = candidate.orientation?.value ?? 0;
  const named = candidate.orientation !== null;
  return [
    { title: named ? 'Profile along the axis' : 'Profile from left to right', angle },
    { title: named ? 'Profile across the axis' : 'Profile from bottom to top', angle: angle + Math.PI / 2 },
  ];
}

/** The level below which a fifth of the pixels lie: a background where nothing was fitted. */
function lowLevel(plane: Plane): number {
  const step = Math.max(1, Math.floor(plane.counts.length / 20_000));
  const sample = plane.counts.filter((_, i) => i % step === 0).sort();
  return sample[Math.floor(0.2 * sample.length)] ?? 0;
}
