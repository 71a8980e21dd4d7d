import { figureLayout, figureSvg, figureTable, type FigureData } from '../../figures/index.ts';
import { DragHandle } from './drag-handle.ts';
import { element } from './element.ts';
import type { PointDrag } from './point-drag.ts';
import { spoken } from './spoken.ts';
import { tableElement } from './value-table.ts';

const LEAST_WIDTH = 320;

/** A figure in the page: drawn at the width it is given, with its notes, and its data as a table on request. */
export class FigureFrame {
  readonly element: HTMLElement;
  private readonly drawing = element('div', 'figure-drawing');
  private readonly caption = element('p', 'caption');
  private readonly notes = element('div', 'figure-notes');
  private readonly data = element('details', 'figure-data', element('summary', '', 'Data'));
  private readonly handle: DragHandle;
  private readonly sizes: ResizeObserver;
  private width = 0;

  constructor(
    private figure: FigureData,
    drag: PointDrag,
  ) {
    this.handle = new DragHandle(drag);
    const handle = figure.kind === 'region' ? this.handle.element : null;
    const plane = element('div', 'figure-plane', this.drawing, handle);
    this.element = element(
      'div',
      `figure-frame figure-frame-${figure.kind}`,
      plane,
      this.caption,
      this.notes,
      this.data,
    );
    this.element.setAttribute('role', 'group');
    this.data.addEventListener('toggle', () => this.showData());
    this.sizes = new ResizeObserver(([entry]) => this.resize(entry?.contentRect.width ?? 0));
    this.sizes.observe(plane);
    this.show(figure);
  }

  get kind(): FigureData['kind'] {
    return this.figure.kind;
  }

  /** Shows other data in the same place. */
  show(figure: FigureData): void {
    this.figure = figure;
    this.element.setAttribute('aria-label', figureName(figure));
    this.caption.textContent = figure.title ?? '';
    this.notes.replaceChildren(
      ...figure.notes.map((note) => element('p', 'note', ...spoken(note))),
    );
    this.draw();
    if (this.data.open) this.showData();
  }

  close(): void {
    this.sizes.disconnect();
  }

  private resize(width: number): void {
    if (Math.abs(width - this.width) < 1) return;
    this.width = width;
    this.draw();
  }

  private draw(): void {
    if (this.width === 0) return;
    const size = sizeFor(this.figure, Math.max(LEAST_WIDTH, this.width));
    // The figures layer escapes every text that it writes.
    this.drawing.innerHTML = figureSvg(this.figure, size);
    const panel = figureLayout(this.figure, size).panels[0];
    if (this.figure.kind === 'region' && panel) this.handle.show(this.figure, panel);
  }

  private showData(): void {
    const summary = this.data.firstElementChild;
    const table = this.data.open ? [tableElement(figureTable(this.figure))] : [];
    this.data.replaceChildren(...(summary ? [summary] : []), ...table);
  }
}

function figureName(figure: FigureData): string {
  const kind = figure.kind === 'region' ? 'Gain plane' : 'Response';
  return figure.title === null ? kind : `${kind}: ${figure.title}`;
}

function sizeFor(figure: FigureData, width: number): { width: number; height: number } {
  if (figure.kind === 'region') return { width, height: Math.round(width * 0.6) };
  const panels = new Set(figure.curves.map(({ axisLabel }) => axisLabel)).size;
  return { width, height: Math.round(Math.min(width * 0.45, 300) * Math.max(1, panels)) };
}
