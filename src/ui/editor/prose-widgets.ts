import { WidgetType } from '@codemirror/view';
import { typeset } from '../results/mathematics.ts';
import { element } from '../results/element.ts';
import { withMinus } from '../results/minus.ts';

/** Maths in prose, typeset. */
export class MathsWidget extends WidgetType {
  constructor(
    private readonly latex: string,
    private readonly display: boolean,
  ) {
    super();
  }

  override eq(other: MathsWidget): boolean {
    return other.latex === this.latex && other.display === this.display;
  }

  override toDOM(): HTMLElement {
    return typeset(this.latex, this.display ? 'display' : 'text');
  }

  override ignoreEvent(): boolean {
    return false;
  }
}

/** The present value of a name in prose. */
export class ReferenceWidget extends WidgetType {
  constructor(
    private readonly name: string,
    private readonly shown: string | null,
  ) {
    super();
  }

  override eq(other: ReferenceWidget): boolean {
    return other.name === this.name && other.shown === this.shown;
  }

  override toDOM(): HTMLElement {
    const made = element('span', 'reference', this.shown === null ? '–' : withMinus(this.shown));
    made.title =
      this.shown === null ? `${this.name} has no value` : `present value of ${this.name}`;
    return made;
  }

  override ignoreEvent(): boolean {
    return false;
  }
}

/** Text that stands for markup: a bullet, the space between two lines of a paragraph, a forced line break. */
export class StandInWidget extends WidgetType {
  constructor(
    private readonly className: string,
    private readonly text: string,
  ) {
    super();
  }

  override eq(other: StandInWidget): boolean {
    return other.className === this.className && other.text === this.text;
  }

  override toDOM(): HTMLElement {
    return this.text === '\n' ? element('br', '') : element('span', this.className, this.text);
  }

  override ignoreEvent(): boolean {
    return false;
  }
}
