import type { RegionFigure } from '../../figures/index.ts';

/** What a drag of a gain plane's point does. Positions are in the axes' units. */
export interface PointDrag {
  begin(figure: RegionFigure): void;
  move(figure: RegionFigure, x: number, y: number): void;
  finish(): void;
  cancel(): void;
}
