import { toFrame, type Frame, type View } from '#src/ui/pattern/view.ts';

export interface Marks {
  /** Picture pixels. */
  readonly center: { readonly x: number; readonly y: number };
  /** Radians counter-clockwise as displayed; null for round shapes. */
  readonly axis: number | null;
  /** Metres at the pattern per picture pixel. */
  readonly pixelPitch: number;
}

/** Lines of the overlay stand on a dark halo, so that they read on every colour. */
function stroke(context: CanvasRenderingContext2D, colour: string, width: number, dash: number[]): void {
  context.setLineDash([]);
  context.strokeStyle = 'rgba(5, 2, 1, 0.75)';
  context.lineWidth = width + 2.5;
  context.stroke();
  context.setLineDash(dash);
  context.strokeStyle = colour;
  context.lineWidth = width;
  context.stroke();
  context.setLineDash([]);
}

/** Centre ring and, for shapes with an axis, both principal axes. */
export function drawMarks(
  context: CanvasRenderingContext2D,
  marks: Marks,
  view: View,
  frame: Frame,
  colour: string,
): void {
  const c = toFrame(view, marks.center.x, marks.center.y, frame);
  if (marks.axis !== null) {
    const far = Math.hypot(frame.width, frame.height);
    for (const turn of [0, Math.PI / 2]) {
      const dx = Math.cos(marks.axis + turn);
      const dy = -Math.sin(marks.axis + turn);
      context.beginPath();
      context.moveTo(c.x - far * dx, c.y - far * dy);
      context.lineTo(c.x - 10 * dx, c.y - 10 * dy);
      context.moveTo(c.x + 10 * dx, c.y + 10 * dy);
      context.lineTo(c.x + far * dx, c.y + far * dy);
      stroke(context, colour, 1, turn === 0 ? [7, 4] : [1, 5]);
    }
  }
  context.beginPath();
  context.arc(c.x, c.y, 7, 0, 2 * Math.PI);
  stroke(context, colour, 1.6, []);
}

/** The seam: a line through the centre, measured on its left as one looks along it. */
export function drawSeam(
  context: CanvasRenderingContext2D,
  center: { x: number; y: number },
  seam: number,
  view: View,
  frame: Frame,
  colour: string,
): void {
  const c = toFrame(view, center.x, center.y, frame);
  const far = Math.hypot(frame.width, frame.height);
  context.beginPath();
  context.moveTo(c.x - far * Math.cos(seam), c.y + far * Math.sin(seam));
  context.lineTo(c.x + far * Math.cos(seam), c.y - far * Math.sin(seam));
  stroke(context, colour, 1.4, []);
}

/** A round length (1, 2 or 5) in metres that is at most `width` CSS pixels long, and its length in CSS pixels. */
export function scaleBar(view: View, pixelPitch: number, width: number): { length: number; pixels: number } {
  const most = (width / view.zoom) * pixelPitch;
  const decade = 10 ** Math.floor(Math.log10(most));
  const step = [5, 2, 1].find((s) => s * decade <= most) ?? 1;
  return { length: step * decade, pixels: ((step * decade) / pixelPitch) * view.zoom };
}
