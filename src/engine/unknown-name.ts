import type { Span } from '../base/index.ts';
import { sourceNamed } from '../functions/index.ts';
import { nearestName } from '../language/index.ts';
import type { Meanings } from './meanings.ts';
import { stopAt } from './stop.ts';

/** Stops at a name that nothing introduces, with what was likely meant. */
export function stopAtUnknownName(name: string, span: Span, meanings: Meanings): never {
  refuseSignal(name, span, meanings);
  refuseWord(name, span, meanings);
  const near = nearestName(name, meanings.knownNames());
  stopAt(
    span,
    'unknown-name',
    `Nothing introduces ${name}.${near ? ` Is ${near} meant?` : ` Give it a value (\`${name} is …\`), a definition or a sign.`}`,
    near ? [{ title: `Write ${near}`, edits: [{ span, insert: near }] }] : [],
  );
}

/** A signal has a value outside its loop only in a load case. */
function refuseSignal(name: string, span: Span, meanings: Meanings): void {
  const loops = meanings.loopsWithSignal(name);
  if (loops.length === 0) return;
  const cases = loops.flatMap((loop) => meanings.casesOf(loop));
  const path = cases.length === 1 ? `${cases[0]}.${name}` : null;
  const where = `outside the loop it is reached through a load case, \`${path ?? `case.${name}`}\``;
  stopAt(
    span,
    'signal-outside-loop',
    `${name} is a signal of ${loops.join(' and ')}; ${where}.`,
    path ? [{ title: `Write ${path}`, edits: [{ span, insert: path }] }] : [],
  );
}

/** Words that mean something elsewhere in the language or in mathematics. */
function refuseWord(name: string, span: Span, meanings: Meanings): void {
  if (name === 't') {
    const message = 'Formulas stand in s; use `response(x)` for a function of t.';
    stopAt(span, 'time-in-formula', message);
  }
  if (name === 'e') {
    stopAt(span, 'unknown-name', "Nothing introduces e; Euler's number is `exp(1)`.");
  }
  if (meanings.functionNamed(name)) {
    const message = `${name} is a function; its argument stands in brackets, \`${name}(x)\`.`;
    stopAt(span, 'function-as-value', message);
  }
  if (sourceNamed(name)) {
    const message = `${name} is a source; sources stand in the lines of a load case, \`w = ${name}(…)\`.`;
    stopAt(span, 'source-outside-case', message);
  }
}
