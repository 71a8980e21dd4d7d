/**
 * What a figure shows, as plain frozen data in display units, ready to cross to a page. Everything that is seen is
 * in it; size and colours are not.
 */
export type FigureData = RegionFigure | ResponseFigure;

export type Point = readonly [x: number, y: number];
/** An open line through points. */
export type Line = readonly Point[];
/** A closed line; the first point is not repeated. */
export type Ring = readonly Point[];
/** An outer ring and the rings of its holes. */
export type Polygon = readonly Ring[];

/** One axis: `name` is the quantity's name (`Kp`), `label` what is written at it (`gain Kp, kN m/rad`). */
export interface Axis {
  readonly name: string;
  readonly label: string;
  readonly unit: string;
  readonly from: number;
  readonly to: number;
}

/** A condition's boundary: where it bounds the area, and elsewhere, where it is drawn lightly. */
export interface Boundary {
  readonly label: string;
  readonly latex: string | null;
  readonly lines: readonly Line[];
  readonly elsewhere: readonly Line[];
}

/** A gain plane: where conditions hold. */
export interface RegionFigure {
  readonly kind: 'region';
  readonly title: string | null;
  readonly x: Axis;
  readonly y: Axis;
  /** Where every condition holds at nominal values. */
  readonly nominalArea: readonly Polygon[];
  /** Where every condition holds over the tolerances; null if nothing is toleranced. */
  readonly toleranceArea: readonly Polygon[] | null;
  readonly boundaries: readonly Boundary[];
  /** Boundaries pinned earlier, to compare against: drawn dashed and quiet. */
  readonly baseline: readonly Line[];
  /** Names of the worksheet in the boundaries' labels, as they stand there. */
  readonly names: readonly string[];
  /** The present gains; `draggable` if both are numbers that the text holds. */
  readonly point: { readonly x: number; readonly y: number; readonly draggable: boolean } | null;
  readonly notes: readonly string[];
}

/** A curve over time; `band` is its range over the tolerances, at the same times as its points. */
export interface Curve {
  readonly label: string;
  /** What is written at the vertical axis: `error e, mrad`. Curves with the same text share a panel. */
  readonly axisLabel: string;
  readonly unit: string;
  readonly points: Line;
  readonly band: { readonly low: readonly number[]; readonly high: readonly number[] } | null;
  /** Pinned earlier, to compare against: drawn dashed and quiet. */
  readonly baseline: boolean;
}

/** Signals over time. */
export interface ResponseFigure {
  readonly kind: 'response';
  readonly title: string | null;
  readonly x: Axis;
  readonly curves: readonly Curve[];
  /** Which curve grows without bound, and why; null if none does. */
  readonly diverges: string | null;
  readonly notes: readonly string[];
}
