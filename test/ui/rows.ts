import type {
  AssumptionContent,
  Placed,
  Report,
  RequirementContent,
  ResultContent,
} from '../../src/engine/index.ts';

/** A result for tests, with what is given of it. */
export function result(given: Partial<ResultContent>): ResultContent {
  return {
    name: null,
    nameLatex: null,
    kind: 'value',
    formula: null,
    latex: null,
    value: null,
    unit: null,
    shown: null,
    span: null,
    notes: [],
    parts: null,
    figure: null,
    state: 'ready',
    waitsFor: null,
    dependsOn: [],
    ...given,
  };
}

/** A requirement for tests: met, found at the corners, unless said otherwise. */
export function requirement(given: Partial<RequirementContent>): RequirementContent {
  return {
    label: null,
    text: 'stable(az)',
    latex: '',
    verdict: 'met',
    nominal: null,
    worst: null,
    limit: null,
    operator: null,
    unit: null,
    how: 'corners',
    n: null,
    at: null,
    notes: [],
    shown: '',
    waitsFor: null,
    dependsOn: [],
    ...given,
  };
}

/** An assumption for tests. */
export function assumption(given: Partial<AssumptionContent>): AssumptionContent {
  return {
    name: 'Kp',
    nameLatex: 'K_p',
    description: null,
    valueText: '',
    toleranceText: null,
    sign: null,
    number: null,
    unit: null,
    unitLatex: null,
    numberSpan: null,
    slider: null,
    used: true,
    ...given,
  };
}

export function placed<Content>(content: Content, from = 0, to = from + 1): Placed<Content> {
  return { from, to, line: 1, content };
}

/** A report with the rows given. */
export function report(given: Partial<Report>): Report {
  return {
    results: [],
    requirements: [],
    assumptions: [],
    problems: [],
    references: [],
    loops: [],
    ...given,
  };
}
