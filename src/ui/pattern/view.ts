/** Which part of a picture is shown: CSS pixels per picture pixel, and the picture point in the middle of the frame. */
export interface View {
  readonly zoom: number;
  readonly x: number;
  readonly y: number;
}

export interface Frame {
  readonly width: number;
  readonly height: number;
}

const largestZoom = 24;

/** The view that shows the whole picture. */
export function fittingView(picture: Frame, frame: Frame): View {
  const zoom = Math.min(frame.width / picture.width, frame.height / picture.height);
  return { zoom, x: (picture.width - 1) / 2, y: (picture.height - 1) / 2 };
}

/** Zooms by a factor while the picture point under (px, py) of the frame stays where it is. */
export function zoomAbout(
  view: View,
  factor: number,
  px: number,
  py: number,
  picture: Frame,
  frame: Frame,
): View {
  const least = 0.8 * fittingView(picture, frame).zoom;
  const zoom = Math.min(largestZoom, Math.max(least, view.zoom * factor));
  const at = toPicture(view, px, py, frame);
  return { zoom, x: at.x - (px - frame.width / 2) / zoom, y: at.y - (py - frame.height / 2) / zoom };
}

/** Moves the view by CSS pixels; its middle stays on the picture. */
export function panBy(view: View, dx: number, dy: number, picture: Frame): View {
  const clamp = (v: number, top: number) => Math.min(top, Math.max(0, v));
  return {
    zoom: view.zoom,
    x: clamp(view.x - dx / view.zoom, picture.width - 1),
    y: clamp(view.y - dy / view.zoom, picture.height - 1),
  };
}

/** The picture point under a point of the frame. */
export function toPicture(view: View, px: number, py: number, frame: Frame): { x: number; y: number } {
  return { x: view.x + (px - frame.width / 2) / view.zoom, y: view.y + (py - frame.height / 2) / view.zoom };
}

/** The point of the frame where a picture point is shown. */
export function toFrame(view: View, x: number, y: number, frame: Frame): { x: number; y: number } {
  return { x: frame.width / 2 + (x - view.x) * view.zoom, y: frame.height / 2 + (y - view.y) * view.zoom };
}
