import { invertedEffects } from '@codemirror/commands';
import {
  MapMode,
  StateEffect,
  StateField,
  type ChangeDesc,
  type EditorState,
  type Extension,
} from '@codemirror/state';
import { joinText, type LineEnding, type SplitText } from './line-endings.ts';

type Endings = Omit<SplitText, 'plain'>;

interface PlacedEnding {
  readonly place: number;
  readonly ending: LineEnding;
}

const restoreEnding = StateEffect.define<PlacedEnding>({
  map: ({ place, ending }, changes) => ({ place: changes.mapPos(place, 1), ending }),
});

const endingsField = StateField.define<Endings>({
  create: () => ({ mark: '', usual: '\n', unusual: new Map() }),
  update(endings, transaction) {
    const restored = transaction.effects.filter((effect) => effect.is(restoreEnding));
    if (restored.length === 0 && (!transaction.docChanged || endings.unusual.size === 0)) {
      return endings;
    }
    const unusual = mapEndings(endings.unusual, transaction.changes);
    for (const { value } of restored) unusual.set(value.place, value.ending);
    return { ...endings, unusual };
  },
});

/** What undoing a change brings back: the unusual endings of the lines that it joined. */
const bringBack = invertedEffects.of((transaction) => {
  const { unusual } = transaction.startState.field(endingsField);
  return [...unusual]
    .filter(([place]) => isDeleted(place, transaction.changes))
    .map(([place, ending]) => restoreEnding.of({ place, ending }));
});

/** Keeps the line endings of a file beside its text while it is edited. */
export function keepEndings({ mark, usual, unusual }: SplitText): Extension {
  return [endingsField.init(() => ({ mark, usual, unusual })), bringBack];
}

/** The text of the file as it would be saved now. */
export function fileText(state: EditorState): string {
  return joinText({ plain: state.doc.toString(), ...state.field(endingsField) });
}

function mapEndings(unusual: ReadonlyMap<number, LineEnding>, changes: ChangeDesc) {
  const mapped = new Map<number, LineEnding>();
  for (const [place, ending] of unusual) {
    if (!isDeleted(place, changes)) mapped.set(changes.mapPos(place, 1), ending);
  }
  return mapped;
}

function isDeleted(place: number, changes: ChangeDesc): boolean {
  return changes.mapPos(place, 1, MapMode.TrackAfter) === null;
}
