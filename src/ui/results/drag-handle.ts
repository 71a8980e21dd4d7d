import { positionOf, valueAt, type Panel, type RegionFigure } from '../../figures/index.ts';
import { element } from './element.ts';
import type { PointDrag } from './point-drag.ts';

/** Pixels that an arrow key moves the point; ten times that with Shift. */
const KEY_STEP = 2;

const ARROWS: Readonly<Record<string, readonly [number, number]>> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, -1],
  ArrowDown: [0, 1],
};

/** The point of a gain plane, dragged with the pointer or moved with the arrow keys. Escape takes a drag back. */
export class DragHandle {
  readonly element = element('button', 'drag-handle');
  private figure: RegionFigure | null = null;
  private panel: Panel | null = null;
  /** The pointer's distance from the point's centre when it was taken; null when it is not dragged. */
  private grip: { readonly x: number; readonly y: number } | null = null;
  private byKeys = false;

  constructor(private readonly drag: PointDrag) {
    this.element.type = 'button';
    this.element.hidden = true;
    this.element.setAttribute('aria-roledescription', 'draggable point');
    this.element.addEventListener('pointerdown', (event) => this.take(event));
    this.element.addEventListener('pointermove', (event) => this.follow(event));
    this.element.addEventListener('pointerup', () => this.release());
    this.element.addEventListener('pointercancel', () => this.giveBack());
    this.element.addEventListener('keydown', (event) => this.key(event));
    this.element.addEventListener('keyup', () => this.releaseKeys());
    this.element.addEventListener('blur', () => this.releaseKeys());
  }

  /** Places the handle on the point of a figure as it was drawn. While it is dragged it stays under the pointer. */
  show(figure: RegionFigure, panel: Panel): void {
    this.figure = figure;
    this.panel = panel;
    const { point, x, y } = figure;
    this.element.hidden = !point?.draggable;
    if (!point) return;
    const place = `${x.label}: ${tidy(point.x)}, ${y.label}: ${tidy(point.y)}`;
    this.element.setAttribute('aria-label', `Present gains. ${place}. Arrow keys move the point.`);
    if (!this.grip && !this.byKeys)
      this.place(positionOf(panel.x, point.x), positionOf(panel.y, point.y));
  }

  private place(left: number, top: number): void {
    this.element.style.left = `${left}px`;
    this.element.style.top = `${top}px`;
  }

  private centre(): { x: number; y: number } {
    return { x: parseFloat(this.element.style.left), y: parseFloat(this.element.style.top) };
  }

  private take(event: PointerEvent): void {
    if (!this.figure || event.button !== 0) return;
    const { x, y } = this.centre();
    this.grip = { x: event.clientX - x, y: event.clientY - y };
    this.element.setPointerCapture(event.pointerId);
    this.drag.begin(this.figure);
  }

  private follow(event: PointerEvent): void {
    if (this.grip) this.moveTo(event.clientX - this.grip.x, event.clientY - this.grip.y);
  }

  private release(): void {
    if (!this.grip) return;
    this.grip = null;
    this.drag.finish();
  }

  private giveBack(): void {
    this.grip = null;
    this.byKeys = false;
    this.drag.cancel();
  }

  private moveTo(left: number, top: number): void {
    if (!this.figure || !this.panel) return;
    const { plot, x, y } = this.panel;
    const inside = {
      x: Math.min(plot.right, Math.max(plot.left, left)),
      y: Math.min(plot.bottom, Math.max(plot.top, top)),
    };
    this.place(inside.x, inside.y);
    this.drag.move(this.figure, valueAt(x, inside.x), valueAt(y, inside.y));
  }

  private key(event: KeyboardEvent): void {
    if (event.key === 'Escape' && (this.grip || this.byKeys)) {
      event.stopPropagation();
      this.giveBack();
      return;
    }
    const arrow = ARROWS[event.key];
    if (!arrow || !this.figure) return;
    event.preventDefault();
    if (!this.byKeys) this.drag.begin(this.figure);
    this.byKeys = true;
    const step = event.shiftKey ? 10 * KEY_STEP : KEY_STEP;
    const { x, y } = this.centre();
    this.moveTo(x + arrow[0] * step, y + arrow[1] * step);
  }

  private releaseKeys(): void {
    if (!this.byKeys) return;
    this.byKeys = false;
    this.drag.finish();
  }
}

function tidy(value: number): string {
  return String(Number(value.toPrecision(4)));
}
