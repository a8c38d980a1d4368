import { useEffect, useEffectEvent, useRef, useState, type PointerEvent } from 'react';
import { printQuantity } from '#shared/quantities.ts';
import { drawMarks, drawSeam, scaleBar, type Marks } from '#src/ui/pattern/overlay.ts';
import { fittingView, panBy, toPicture, zoomAbout, type Frame, type View } from '#src/ui/pattern/view.ts';

interface PatternCanvasProps {
  /** "Measured pattern": name of the figure. */
  label: string;
  picture: HTMLCanvasElement;
  /** The other half beyond the seam, and the seam's direction in radians counter-clockwise. */
  beyond?: { picture: HTMLCanvasElement; seam: number } | undefined;
  marks: Marks | null;
  showMarks: boolean;
  view: View | null;
  onView: (view: View | null) => void;
  /** Picture point under the pointer, or null when it has left. */
  onPoint?: (point: { x: number; y: number } | null) => void;
  /** Turns the seam towards a point while it is dragged with the shift key or by its handle. */
  onSeam?: (seam: number) => void;
  className?: string;
}

/** A painted picture that is panned by drag and arrow keys, zoomed by wheel and + −; double press fits it. */
export function PatternCanvas(props: PatternCanvasProps) {
  const { label, picture, beyond, marks, showMarks, view, onView, onPoint, onSeam, className } = props;
  const canvas = useRef<HTMLCanvasElement>(null);
  const [frame, setFrame] = useState<Frame | null>(null);
  const drag = useRef<{ x: number; y: number; seam: boolean } | null>(null);
  const shown = frame ? (view ?? fittingView(picture, frame)) : null;

  useEffect(() => {
    const element = canvas.current;
    if (!element) return;
    const measure = () => setFrame({ width: element.clientWidth, height: element.clientHeight });
    const observer = new ResizeObserver(measure);
    observer.observe(element);
    measure();
    return () => observer.disconnect();
  }, []);

  useEffect(() => {
    const context = canvas.current?.getContext('2d');
    if (!context || !frame || !shown) return;
    paint(
      context,
      { picture, beyond, marks: showMarks ? marks : null, center: marks?.center ?? null },
      shown,
      frame,
    );
  });

  const zoom = useEffectEvent((event: WheelEvent) => {
    if (!frame || !shown) return;
    event.preventDefault();
    const box = canvas.current!.getBoundingClientRect();
    const factor = Math.exp(-event.deltaY * 0.0015);
    onView(zoomAbout(shown, factor, event.clientX - box.left, event.clientY - box.top, picture, frame));
  });
  useEffect(() => {
    const element = canvas.current;
    const listen = (event: WheelEvent) => zoom(event);
    element?.addEventListener('wheel', listen, { passive: false });
    return () => element?.removeEventListener('wheel', listen);
  }, []);

  const pointOf = (event: PointerEvent) => {
    const box = canvas.current!.getBoundingClientRect();
    return { x: event.clientX - box.left, y: event.clientY - box.top };
  };
  const turnTo = (event: PointerEvent) => {
    if (!marks || !frame || !shown || !onSeam) return;
    const at = toPicture(shown, pointOf(event).x, pointOf(event).y, frame);
    onSeam(Math.atan2(marks.center.y - at.y, at.x - marks.center.x));
  };

  const bar = shown && marks ? scaleBar(shown, marks.pixelPitch, 120) : null;
  return (
    <figure className={className}>
      <canvas
        ref={canvas}
        role="img"
        aria-label={label}
        tabIndex={0}
        className="block aspect-[4/3] w-full cursor-grab touch-none bg-well active:cursor-grabbing"
        onPointerDown={(event) => {
          canvas.current?.setPointerCapture(event.pointerId);
          drag.current = { ...pointOf(event), seam: Boolean(beyond && event.shiftKey) };
          if (drag.current.seam) turnTo(event);
        }}
        onPointerMove={(event) => {
          const at = pointOf(event);
          if (frame && shown) onPoint?.(toPicture(shown, at.x, at.y, frame));
          if (!drag.current || !shown) return;
          if (drag.current.seam) turnTo(event);
          else onView(panBy(shown, at.x - drag.current.x, at.y - drag.current.y, picture));
          drag.current = { ...at, seam: drag.current.seam };
        }}
        onPointerUp={() => (drag.current = null)}
        onPointerLeave={() => onPoint?.(null)}
        onDoubleClick={() => onView(null)}
        onKeyDown={(event) => {
          if (!frame || !shown) return;
          const next = keyView(event.key, shown, picture, frame);
          if (next === undefined) return;
          event.preventDefault();
          event.stopPropagation();
          onView(next);
        }}
      />
      {bar ? (
        <figcaption className="label mt-1.5 flex items-center justify-between gap-4 text-ink2">
          <span>{label}</span>
          <span className="flex items-center gap-2">
            <svg width={bar.pixels + 2} height="8" aria-hidden="true">
              <path d={`M1 0v7h${bar.pixels}V0`} fill="none" stroke="var(--ink)" strokeWidth="1.6" />
            </svg>
            {printQuantity(bar.length, 'mm', 2)}
          </span>
        </figcaption>
      ) : null}
    </figure>
  );
}

/** The view after a key; null fits, undefined when the key means nothing here. */
function keyView(key: string, view: View, picture: Frame, frame: Frame): View | null | undefined {
  const step = 40;
  switch (key) {
    case 'ArrowLeft':
      return panBy(view, step, 0, picture);
    case 'ArrowRight':
      return panBy(view, -step, 0, picture);
    case 'ArrowUp':
      return panBy(view, 0, step, picture);
    case 'ArrowDown':
      return panBy(view, 0, -step, picture);
    case '+':
    case '=':
      return zoomAbout(view, 1.25, frame.width / 2, frame.height / 2, picture, frame);
    case '-':
      return zoomAbout(view, 0.8, frame.width / 2, frame.height / 2, picture, frame);
    case '0':
      return null;
    default:
      return undefined;
  }
}

interface Scene {
  picture: HTMLCanvasElement;
  beyond: { picture: HTMLCanvasElement; seam: number } | undefined;
  marks: Marks | null;
  center: { x: number; y: number } | null;
}

function paint(context: CanvasRenderingContext2D, scene: Scene, view: View, frame: Frame): void {
  const ratio = window.devicePixelRatio || 1;
  const { canvas } = context;
  const [width, height] = [Math.round(frame.width * ratio), Math.round(frame.height * ratio)];
  if (canvas.width !== width || canvas.height !== height) {
    canvas.width = width;
    canvas.height = height;
  }
  const over = getComputedStyle(canvas).getPropertyValue('--over').trim() || '#fff3dc';
  context.setTransform(ratio, 0, 0, ratio, 0, 0);
  context.clearRect(0, 0, frame.width, frame.height);
  context.imageSmoothingEnabled = view.zoom < 2;
  const draw = (picture: HTMLCanvasElement) =>
    context.drawImage(
      picture,
      frame.width / 2 - (view.x + 0.5) * view.zoom,
      frame.height / 2 - (view.y + 0.5) * view.zoom,
      picture.width * view.zoom,
      picture.height * view.zoom,
    );
  draw(scene.picture);
  if (scene.beyond && scene.center) {
    const { seam, picture } = scene.beyond;
    const cx = frame.width / 2 + (scene.center.x - view.x) * view.zoom;
    const cy = frame.height / 2 + (scene.center.y - view.y) * view.zoom;
    const far = 2 * Math.hypot(frame.width, frame.height);
    context.save();
    context.translate(cx, cy);
    context.rotate(-seam);
    context.beginPath();
    context.rect(-far, 0, 2 * far, far);
    context.restore();
    context.save();
    context.clip();
    context.fillStyle = '#000';
    context.fillRect(0, 0, frame.width, frame.height);
    draw(picture);
    context.restore();
    drawSeam(context, scene.center, seam, view, frame, over);
  }
  if (scene.marks) drawMarks(context, scene.marks, view, frame, over);
}
