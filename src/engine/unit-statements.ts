import { errorAt, isRefusal, type Problem, type Refusal, type Span } from '../base/index.ts';
import {
  placeProblem,
  type HasUnitStatement,
  type PlacedStatement,
  type UnitStatement,
} from '../language/index.ts';
import {
  customUnit,
  isUnitSymbol,
  parseUnit,
  type CustomUnits,
  type Unit,
} from '../units/index.ts';
import type { Catalogue } from './catalogue.ts';
import { sentence } from './stop.ts';

/** The units that a worksheet adds with `unit count is 1.2 µrad`; they may be built on each other in any order. */
export function readOwnUnits({ customUnits }: Catalogue): CustomUnits {
  const units = new Map<string, Unit>();
  let pending = customUnits.filter((_, index) => isNewUnit(index, customUnits));
  for (let before = -1; before !== pending.length;) {
    before = pending.length;
    pending = pending.filter(({ node }) => {
      const unit = unitOf(node, units);
      if (isRefusal(unit)) return true;
      units.set(node.name, unit);
      return false;
    });
  }
  return units;
}

function unitOf({ name, value }: UnitStatement, units: CustomUnits): Unit | Refusal {
  const base = parseUnit(value.unit, units);
  return isRefusal(base) ? base : customUnit(name, value.text, base);
}

function isNewUnit(index: number, all: Catalogue['customUnits']): boolean {
  const { name } = all[index].node;
  return !isUnitSymbol(name) && all.findIndex(({ node }) => node.name === name) === index;
}

/** What is wrong with the units that statements add or give to symbols; spans are absolute. */
export function unitProblems(
  catalogue: Catalogue,
  units: CustomUnits,
  lineOf: (offset: number) => number,
): Problem[] {
  const added = catalogue.customUnits.flatMap(({ node, placed }, index) => {
    if (!isNewUnit(index, catalogue.customUnits)) {
      return [placedError(placed, node.nameSpan, 'unit-known', knownText(node.name))];
    }
    return refusalAt(placed, node.value.unitSpan, unitOf(node, units));
  });
  const statements = new Set([...catalogue.units.values()].map(({ placed }) => placed));
  const given = [...statements].flatMap((placed) => {
    const node = placed.node as HasUnitStatement;
    return refusalAt(placed, node.unitSpan, parseUnit(node.unit, units));
  });
  return [...added, ...given];

  function knownText(name: string): string {
    if (isUnitSymbol(name)) return `${name} is a unit already; choose another name.`;
    const first = catalogue.customUnits.find(({ node }) => node.name === name)!;
    return `The unit ${name} is added in line ${lineOf(first.placed.from)} already; keep one.`;
  }
}

function refusalAt(placed: PlacedStatement, span: Span, unit: Unit | Refusal): Problem[] {
  return isRefusal(unit) ? [placedError(placed, span, unit.code, sentence(unit.reason))] : [];
}

function placedError(placed: PlacedStatement, span: Span, code: string, message: string): Problem {
  return placeProblem(errorAt(span, code, message), placed.from);
}
