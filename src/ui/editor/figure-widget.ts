import { WidgetType, type EditorView } from '@codemirror/view';
import type { FigureData } from '../../figures/index.ts';
import { FigureFrame } from '../results/figure-frame.ts';
import { GainDrag } from './gain-drag.ts';

const frames = new WeakMap<HTMLElement, FigureFrame>();

/** A figure under its statement. While its data changes the element stays, so that a drag on it goes on. */
export class FigureWidget extends WidgetType {
  /** `figure` is the evaluator's; `drawn` may have a baseline beside its own curves or boundaries. */
  constructor(
    private readonly figure: FigureData,
    private readonly drawn: FigureData,
  ) {
    super();
  }

  override eq(other: FigureWidget): boolean {
    return other.figure === this.figure && other.lineCount === this.lineCount;
  }

  override toDOM(view: EditorView): HTMLElement {
    const frame = new FigureFrame(this.drawn, new GainDrag(view));
    frames.set(frame.element, frame);
    return frame.element;
  }

  override updateDOM(element: HTMLElement): boolean {
    const frame = frames.get(element);
    if (frame?.kind !== this.figure.kind) return false;
    frame.show(this.drawn);
    return true;
  }

  /** Tells apart the same figure with and without a baseline. */
  private get lineCount(): number {
    return this.drawn.kind === 'response' ? this.drawn.curves.length : this.drawn.baseline.length;
  }

  override destroy(element: HTMLElement): void {
    frames.get(element)?.close();
  }

  override get estimatedHeight(): number {
    return 420;
  }

  override ignoreEvent(): boolean {
    return true;
  }
}
