import { useEffect, useRef } from 'react';
import { useTheme, type Theme } from '#src/lib/theme.ts';
import { colourMapOf } from '#src/ui/colour-maps.ts';
import { familyOf } from '#shared/apertures/registry.ts';
import { normalFrom, seededRandom } from '#shared/physics/random.ts';

/** The opening behind the picture: an ellipse of 150 by 104 µm, long axis at 118°, at 632.8 nm and 250 mm. */
const opening = { major: 150e-6, minor: 104e-6 };
const turn = (118 * Math.PI) / 180;
/** λL over the width of one picture unit (CSS pixel): the scale of the drawing, 18 µm on the sensor. */
const frequencyPerPixel = 18e-6 / (632.8e-9 * 0.25);
/** Zeros of J1 over π: radii of the dark fringes in units of 1/size (Abramowitz & Stegun, table 9.5). */
const darkRings = [3.83171, 7.01559, 10.17347, 13.32369, 16.47063].map((zero) => zero / Math.PI);

const width = 880;
const height = 900;
const centre = { x: 330, y: 450 };
/** The seam leans by 12° and goes through the centre. */
const lean = Math.tan((12 * Math.PI) / 180);
const seamX = (y: number) => centre.x + (centre.y - y) * lean;

/** Measured on the left of the seam, dark fringes of the model on the right: they meet, until a password is refused. */
export function SignInPattern({ apart }: { apart: boolean }) {
  const canvas = useRef<HTMLCanvasElement>(null);
  const theme = useTheme();
  useEffect(() => {
    const context = canvas.current?.getContext('2d');
    if (context) paint(context, theme);
  }, [theme]);
  const shift = apart ? `translate(${46 * lean} -46)` : '';
  return (
    <div className="relative size-full overflow-hidden" aria-hidden="true">
      <canvas
        ref={canvas}
        width={width / 2}
        height={height / 2}
        className="absolute top-1/2 left-0 h-[max(100dvh,900px)] w-auto max-w-none -translate-y-1/2"
        style={{
          clipPath: `polygon(0 0, ${(100 * seamX(0)) / width}% 0, ${(100 * seamX(height)) / width}% 100%, 0 100%)`,
          aspectRatio: `${width} / ${height}`,
        }}
      />
      <svg
        viewBox={`0 0 ${width} ${height}`}
        className="absolute top-1/2 left-0 h-[max(100dvh,900px)] w-auto max-w-none -translate-y-1/2 overflow-visible"
      >
        <clipPath id="model-half">
          <path d={`M${seamX(-200)}-200H1400V1100H${seamX(1100)}z`} />
        </clipPath>
        <g clipPath="url(#model-half)">
          <g
            className="transition-transform duration-[240ms] ease-out"
            transform={shift}
            fill="none"
            stroke="var(--rule)"
            strokeWidth="1.2"
          >
            {darkRings.map((ring, i) => (
              <ellipse
                key={ring}
                rx={ring / opening.major / frequencyPerPixel}
                ry={ring / opening.minor / frequencyPerPixel}
                transform={`translate(${centre.x} ${centre.y}) rotate(${(-turn * 180) / Math.PI})`}
                {...(i === darkRings.length - 1 ? { stroke: 'var(--edge)', strokeDasharray: '4 5' } : {})}
              />
            ))}
          </g>
        </g>
        <path d={`M${seamX(0)} 0 ${seamX(height)} ${height}`} stroke="var(--seam)" strokeWidth="3" />
      </svg>
    </div>
  );
}

/** The far field as a 12-bit sensor would see it, from −4.2 decades to the peak. */
function paint(context: CanvasRenderingContext2D, theme: Theme): void {
  const [w, h] = [width / 2, height / 2];
  const model = familyOf('ellipse').models[0];
  const values = model.fromFamily(opening);
  const [u, v, row] = [new Float64Array(w), new Float64Array(w), new Float64Array(w)];
  const random = seededRandom(28);
  const map = colourMapOf(theme);
  const image = context.createImageData(w, h);
  for (let y = 0; y < h; y++) {
    for (let x = 0; x < w; x++) {
      const fx = (2 * x - centre.x) * frequencyPerPixel;
      const fy = (centre.y - 2 * y) * frequencyPerPixel;
      u[x] = fx * Math.cos(turn) + fy * Math.sin(turn);
      v[x] = fy * Math.cos(turn) - fx * Math.sin(turn);
    }
    model.intensity(values, u, v, row, w);
    for (let x = 0; x < w; x++) {
      const noisy = Math.max(
        row[x] * (1 + 0.05 * normalFrom(random)) + 6e-5 * (1 + 0.5 * normalFrom(random)),
        1e-6,
      );
      const code = 3 * Math.round(255 * Math.min(1, Math.max(0, 1 + Math.log10(noisy) / 4.2)));
      image.data.set([map[code], map[code + 1], map[code + 2], 255], 4 * (y * w + x));
    }
  }
  context.putImageData(image, 0, 0);
}
