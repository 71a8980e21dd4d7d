import type { FigureData } from './data.ts';
import { regionLayout, regionSvg } from './region-svg.ts';
import { responseLayout, responseSvg } from './response-svg.ts';
import type { FigureLayout, FigureSize } from './scale.ts';
import type { Svg } from './svg.ts';

/** Any figure as SVG of this size; a function of its arguments alone. */
export function figureSvg(figure: FigureData, size: FigureSize): Svg {
  return figure.kind === 'region' ? regionSvg(figure, size) : responseSvg(figure, size);
}

/** Where a figure of this size plots: its panels with their scales. */
export function figureLayout(figure: FigureData, size: FigureSize): FigureLayout {
  return figure.kind === 'region' ? regionLayout(figure, size) : responseLayout(figure, size);
}
