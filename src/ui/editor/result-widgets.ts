import { WidgetType, type EditorView } from '@codemirror/view';
import type { Fix, Problem } from '../../base/index.ts';
import type { LoopContent, RequirementContent, ResultContent } from '../../engine/index.ts';
import type { Movement } from '../baseline.ts';
import { element } from '../results/element.ts';
import { equationsElement } from '../results/equations.ts';
import { problemRow } from '../results/problem-row.ts';
import { requirementRow } from '../results/requirement-row.ts';
import { resultRow } from '../results/result-row.ts';

/** Whether a row moved with the newest report, and what it was under the baseline. */
export interface RowChange {
  readonly moved: boolean;
  readonly movement: Movement | null;
}

function sameChange(a: RowChange, b: RowChange): boolean {
  return (
    a.moved === b.moved && a.movement?.was === b.movement?.was && a.movement?.by === b.movement?.by
  );
}

/** A row under its statement. Two widgets with the same content object draw the same. */
abstract class RowWidget<Content> extends WidgetType {
  constructor(
    protected readonly content: Content,
    protected readonly change: RowChange,
  ) {
    super();
  }

  abstract draw(): HTMLElement;

  override eq(other: RowWidget<Content>): boolean {
    return other.content === this.content && sameChange(other.change, this.change);
  }

  override toDOM(): HTMLElement {
    const frame = element('div', 'row', this.draw());
    if (this.change.moved) frame.classList.add('moved');
    return frame;
  }

  override get estimatedHeight(): number {
    return 34;
  }

  override ignoreEvent(): boolean {
    return true;
  }
}

export class ResultWidget extends RowWidget<ResultContent> {
  override draw(): HTMLElement {
    return resultRow(this.content, this.change.movement);
  }
}

export class RequirementWidget extends RowWidget<RequirementContent> {
  override draw(): HTMLElement {
    return requirementRow(this.content, this.change.movement);
  }
}

/** The equations of a loop, typeset as they were read. */
export class LoopWidget extends RowWidget<LoopContent> {
  override eq(other: LoopWidget): boolean {
    return other.content.equationsLatex.join('\n') === this.content.equationsLatex.join('\n');
  }

  override draw(): HTMLElement {
    return equationsElement(this.content);
  }
}

/** A problem under its statement. Its fixes are edits of the text as it stood when the problem was found. */
export class ProblemWidget extends WidgetType {
  constructor(
    private readonly problem: Problem,
    private readonly applyFix: (view: EditorView, fix: Fix) => void,
  ) {
    super();
  }

  override eq(other: ProblemWidget): boolean {
    const { message, severity, fixes } = this.problem;
    return (
      other.problem.message === message &&
      other.problem.severity === severity &&
      JSON.stringify(other.problem.fixes) === JSON.stringify(fixes)
    );
  }

  override toDOM(view: EditorView): HTMLElement {
    return element(
      'div',
      'row',
      problemRow(this.problem, (fix) => this.applyFix(view, fix)),
    );
  }

  override get estimatedHeight(): number {
    return 26;
  }

  override ignoreEvent(): boolean {
    return true;
  }
}
