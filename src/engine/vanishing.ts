import { dependsOn, laplace } from '../algebra/index.ts';
import { compileConditions, truth, type Condition, type Value } from '../control/index.ts';
import { nameToText } from '../language/index.ts';
import { conditionText, valueText, type Writing } from '../present/index.ts';
import type { Derivations } from './derivations.ts';
import type { Compiled, Numbers, Points, Subject } from './numbers.ts';
import { BASE_SCOPE } from './scope.ts';

const NOMINAL: Points = { count: 1, columns: new Map() };

/**
 * The note that a value does not follow from the formula shown, because an assumption that is exactly 0 made vanish
 * what the formula was divided by: `With Ki = 0 derived anew: Tw/Kp.`
 */
export function vanishingNotes(
  subject: Subject,
  numbers: Numbers,
  derivations: Derivations,
): readonly string[] {
  const zeros = numbers.zeros(subject);
  if (zeros.length === 0) return [];
  const [shown, anew] = [BASE_SCOPE, numbers.zeroScope(zeros)].map((scope) =>
    numbers.compiled(subject, scope),
  );
  if (!shown || !anew || !isAnother(shown, anew, numbers, derivations)) return [];
  const names = zeros.map((name) => `${nameToText(name)} = 0`).join(' and ');
  return [`With ${names} derived anew: ${inWords(anew.value, derivations.writing())}.`];
}

function inWords(value: Value, writing: Writing): string {
  if (value.kind === 'none') return 'there is no value';
  const text = valueText(value, writing);
  const settled = [true, false].find((held) => conditionText(truth(held), writing) === text);
  if (value.kind !== 'condition' || settled === undefined) return text;
  return settled ? 'it always holds' : 'it never holds';
}

/** Whether two derivations of one subject say different things at the nominal values. */
function isAnother(
  shown: Compiled,
  anew: Compiled,
  numbers: Numbers,
  derivations: Derivations,
): boolean {
  const [a, b] = [shown.value, anew.value];
  if (a.kind !== b.kind) return true;
  if (a.kind === 'array' && b.kind === 'array') return a.routh.rows.length !== b.routh.rows.length;
  if (a.kind === 'text' && b.kind === 'text') return a.text !== b.text;
  if (a.kind === 'formula' && dependsOn(a.ratio, laplace)) return false;
  if (a.kind !== 'formula' && a.kind !== 'condition') return false;
  const after = numbers.evaluate(anew, NOMINAL);
  if (verdictAsWritten(a.when, numbers, derivations) !== after.exists[0]) return true;
  if (a.kind === 'condition')
    return verdictAsWritten(a.condition, numbers, derivations) !== after.verdicts[0];
  return numbers.evaluate(shown, NOMINAL).columns[0][0] !== after.columns[0][0];
}

/** The verdict of a condition as it is written: stability in inequalities, which a falling degree escapes. */
function verdictAsWritten(
  condition: Condition,
  numbers: Numbers,
  derivations: Derivations,
): number {
  const written = derivations.expandStability(condition);
  const compiled = compileConditions([written], numbers.resolve);
  return compiled.evaluate(numbers.inputs(compiled.inputs, NOMINAL), 1)[0][0];
}
