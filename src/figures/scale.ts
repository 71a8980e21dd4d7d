/** A linear scale as data: `domain` in the axis's unit, `range` in pixels. */
export interface Scale {
  readonly domain: readonly [number, number];
  readonly range: readonly [number, number];
}

/** Pixel position of a value. */
export function positionOf(scale: Scale, value: number): number {
  const [d0, d1] = scale.domain;
  const [r0, r1] = scale.range;
  return r0 + ((value - d0) / (d1 - d0)) * (r1 - r0);
}

/** Value at a pixel position; inverse of {@link positionOf}. */
export function valueAt(scale: Scale, position: number): number {
  const [d0, d1] = scale.domain;
  const [r0, r1] = scale.range;
  return d0 + ((position - r0) / (r1 - r0)) * (d1 - d0);
}

/** The rectangle that is plotted in, in pixels from the figure's top left corner. */
export interface Box {
  readonly left: number;
  readonly top: number;
  readonly right: number;
  readonly bottom: number;
}

/** One plotting rectangle with its scales; what a page needs to turn pointer positions into values and back. */
export interface Panel {
  readonly plot: Box;
  readonly x: Scale;
  readonly y: Scale;
}

export interface FigureSize {
  readonly width: number;
  readonly height: number;
}

export interface FigureLayout extends FigureSize {
  readonly panels: readonly Panel[];
}

/** A panel over a rectangle, with y upwards. */
export function panelOver(
  plot: Box,
  x: readonly [number, number],
  y: readonly [number, number],
): Panel {
  return {
    plot,
    x: { domain: x, range: [plot.left, plot.right] },
    y: { domain: y, range: [plot.bottom, plot.top] },
  };
}
