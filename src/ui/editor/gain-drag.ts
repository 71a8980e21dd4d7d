import type { EditorView } from '@codemirror/view';
import type { RegionFigure } from '../../figures/index.ts';
import type { PointDrag } from '../results/point-drag.ts';
import { numberText, roundDragged } from '../rounding.ts';
import { NumberDrag, type NumberTexts } from './number-drag.ts';
import { sheetOf } from './sheet-field.ts';

/** Drags the two gains of a gain plane: positions in the plane become numbers in the text. */
export class GainDrag implements PointDrag {
  private drag: NumberDrag | null = null;

  constructor(private readonly view: EditorView) {}

  begin(figure: RegionFigure): void {
    this.drag ??= new NumberDrag(this.view, [figure.x.name, figure.y.name]);
  }

  move(figure: RegionFigure, x: number, y: number): void {
    this.drag?.move(this.numbersAt(figure, x, y));
  }

  finish(): void {
    this.drag?.finish();
    this.drag = null;
  }

  cancel(): void {
    this.drag?.cancel();
    this.drag = null;
  }

  private numbersAt(
    { x: xAxis, y: yAxis, point }: RegionFigure,
    x: number,
    y: number,
  ): NumberTexts {
    return new Map([
      [xAxis.name, this.numberAt(xAxis, x, point?.x ?? null)],
      [yAxis.name, this.numberAt(yAxis, y, point?.y ?? null)],
    ]);
  }

  /** The text of a gain at a place on its axis: rounded in the unit in which the gain is typed. */
  private numberAt(axis: RegionFigure['x'], at: number, present: number | null): string {
    const scale = this.typedPerAxis(axis.name, present);
    return numberText(roundDragged(at * scale, (axis.to - axis.from) * scale));
  }

  /** How many of the typed unit make one of the axis's; both are known of the present gain. */
  private typedPerAxis(name: string, present: number | null): number {
    const { report } = sheetOf(this.view.state);
    const gain = report?.assumptions.find(({ content }) => content.name === name)?.content;
    if (!gain?.number || !present) return 1;
    return Number((gain.number / present).toPrecision(9));
  }
}
