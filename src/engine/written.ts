import { laplace, type Generator } from '../algebra/index.ts';
import type { ArrayValue, FormulaValue, Value } from '../control/index.ts';
import { recordSigns } from '../functions/index.ts';
import {
  conditionText,
  formulaLatex,
  formulaText,
  routhRows,
  valueLatex,
  valueText,
  type Shape,
  type Writing,
} from '../present/index.ts';

/** A derived value as it is written; nothing in it is a number of the numeric stage. */
export interface Written {
  /** Re-readable text; null where there is nothing to read. */
  readonly formula: string | null;
  readonly latex: string;
  /** The rows and conditions of a Routh array; null for all else. */
  readonly array: unknown;
  /** Which signs were used to simplify conditions, and what is not written. */
  readonly notes: readonly string[];
}

/** Writes a derived value. */
export function writtenForm(value: Value, writing: Writing): Written {
  const signs = recordSigns(writing.signOf);
  const isCondition = value.kind === 'condition';
  const formula = formulaOf(value, isCondition ? { ...writing, signOf: signs.signOf } : writing);
  return {
    formula,
    latex: latexOf(value, writing),
    array: value.kind === 'array' ? arrayParts(value, writing) : null,
    notes: isCondition ? signs.notes() : noiseNotes(value),
  };
}

function noiseNotes(value: Value): readonly string[] {
  const isNoisy = value.kind === 'signal' && value.terms.some((term) => term.noise);
  return isNoisy ? ['The noise in it has no transform and is left out.'] : [];
}

function formulaOf(value: Value, writing: Writing): string | null {
  if (value.kind === 'none') return null;
  if (value.kind === 'formula') return formulaText(value.ratio, writing, ...formArguments(value));
  return valueText(value, writing);
}

function latexOf(value: Value, writing: Writing): string {
  if (value.kind === 'formula' && value.form)
    return formulaLatex(value.ratio, writing, ...formArguments(value));
  return valueLatex(value, writing);
}

/** How `expand`, `factor` and the like ask a formula to be written. */
function formArguments({ form }: FormulaValue): [shape?: Shape, main?: Generator] {
  if (!form) return [];
  return form.kind === 'collected' ? ['readable', form.by] : [form.kind, laplace];
}

function arrayParts({ routh }: ArrayValue, writing: Writing): unknown {
  const conditions = routh.conditions.map((condition) => conditionText(condition, writing));
  return { rows: routhRows(routh, writing), conditions, counts: routh.counts };
}
