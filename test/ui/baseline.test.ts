import { describe, expect, it } from 'vitest';
import type { RegionFigure, ResponseFigure } from '../../src/figures/index.ts';
import {
  assumptionWas,
  distance,
  figureWithBaseline,
  pinBaseline,
  requirementMovement,
  resultKeys,
  resultMovement,
} from '../../src/ui/baseline.ts';
import { nextSheet, withBaseline, freshSheet } from '../../src/ui/sheet-keeper.ts';
import { assumption, placed, report, requirement, result } from './rows.ts';

const error = (value: number, shown: string) =>
  result({ name: 'e_ss', formula: '-Tw/Kp', value, shown });

describe('keys of rows', () => {
  it('are names, else the source, told apart where it stands twice', () => {
    const text = 'poles(H)\npoles(H)\ne = 1';
    const rows = [
      placed(result({}), 0, 8),
      placed(result({}), 9, 17),
      placed(result({ name: 'e' }), 18, 23),
    ];
    expect(resultKeys(report({ results: rows }), text)).toEqual([
      '= poles(H)',
      '= poles(H) #2',
      'e',
    ]);
  });
});

describe('the baseline', () => {
  const then = report({
    results: [placed(error(-0.0289, '-28.9 mrad'))],
    requirements: [placed(requirement({ text: 'a', verdict: 'met', shown: '0.12 of 0.2 mrad' }))],
    assumptions: [placed(assumption({ valueText: '9 kN m/rad' }))],
  });
  const baseline = pinBaseline(then, '');

  it('says what a value was and by which ratio it moved', () => {
    expect(resultMovement(baseline, 'e_ss', error(-0.0217, '-21.7 mrad'))).toEqual({
      was: 'was -28.9 mrad',
      by: '× 0.751',
    });
  });

  it('says nothing of a value that is the same, or is new', () => {
    expect(resultMovement(baseline, 'e_ss', error(-0.0289, '-28.9 mrad'))).toBeNull();
    expect(resultMovement(baseline, 'other', error(1, '1'))).toBeNull();
  });

  it('says that a derived form was another where the value happens to be the same', () => {
    const other = result({ name: 'e_ss', formula: '-Tw/(2 Kp)', value: 0, shown: '-28.9 mrad' });
    expect(resultMovement(baseline, 'e_ss', other)).toEqual({ was: 'was -Tw/Kp', by: null });
  });

  it('gives the difference in the unit shown where the sign changed or one value is zero', () => {
    expect(distance(-0.01, 0.02, '20 mrad')).toBe('+30');
    expect(distance(0.02, -0.01, '-10 mrad')).toBe('−30');
    expect(distance(0, 0.02, '20 mrad')).toBe('+20');
  });

  it('gives no distance to or from what is no number', () => {
    expect(distance(null, 1, '1')).toBeNull();
    expect(distance(true, false, 'false')).toBeNull();
    expect(distance(0.02, 0, '0 mrad')).toBeNull();
  });

  it('says what a verdict was', () => {
    const now = requirement({ text: 'a', verdict: 'not met', shown: '0.3 of 0.2 mrad' });
    expect(requirementMovement(baseline, 'a', now)?.was).toBe('was met, 0.12 of 0.2 mrad');
  });

  it('says what an assumption was as typed', () => {
    expect(assumptionWas(baseline, 'Kp', '12 kN m/rad')).toBe('was 9 kN m/rad');
    expect(assumptionWas(baseline, 'Kp', '9 kN m/rad')).toBeNull();
  });
});

describe('figures under a baseline', () => {
  const axis = { name: 't', label: 'time t, s', unit: 's', from: 0, to: 1 };
  const response = (axisLabel: string): ResponseFigure => ({
    kind: 'response',
    title: null,
    x: axis,
    curves: [{ label: 'e', axisLabel, unit: '', points: [[0, 1]], band: null, baseline: false }],
    diverges: null,
    notes: [],
  });
  const then = response('e, mrad');
  const pinned = pinBaseline(
    report({ results: [placed(result({ name: 'f', figure: then }))] }),
    '',
  );

  it('have the curves as they were beside their own', () => {
    const drawn = figureWithBaseline(pinned, 'f', response('e, mrad')) as ResponseFigure;
    expect(drawn.curves.map(({ label, baseline }) => [label, baseline])).toEqual([
      ['e', false],
      ['e, baseline', true],
    ]);
  });

  it('have the boundaries as they were, where these moved in the same plane', () => {
    const side = { name: 'Kp', label: 'gain Kp', unit: '', from: 0, to: 10 };
    const plane = (at: number, label = 'gain Kp'): RegionFigure => ({
      kind: 'region',
      title: null,
      x: { ...side, label },
      y: { ...side, name: 'Ki' },
      nominalArea: [],
      toleranceArea: null,
      boundaries: [{ label: 'Kp > 1', latex: null, lines: [[[at, 0]]], elsewhere: [] }],
      baseline: [],
      names: [],
      point: null,
      notes: [],
    });
    const results = [placed(result({ name: 'f', figure: plane(1) }))];
    const drawn = (now: RegionFigure) =>
      figureWithBaseline(pinBaseline(report({ results }), ''), 'f', now) as RegionFigure;
    expect(drawn(plane(2)).baseline).toEqual([[[1, 0]]]);
    expect(drawn(plane(1)).baseline).toEqual([]);
    expect(drawn(plane(2, 'gain Kp, N m/rad')).baseline).toEqual([]);
  });

  it('are left as they are where nothing changed, is pinned, or can be compared', () => {
    const other = response('T, N m');
    expect(figureWithBaseline(pinned, 'f', then)).toBe(then);
    expect(figureWithBaseline(null, 'f', other)).toBe(other);
    expect((figureWithBaseline(pinned, 'f', other) as ResponseFigure).curves).toHaveLength(1);
  });
});

describe('what moved', () => {
  const before = nextSheet(freshSheet(), report({ results: [placed(error(1, '1 mrad'))] }), '');
  const moved = report({ results: [placed(error(2, '2 mrad')), placed(result({ name: 'new' }))] });

  it('is nothing in the first report of a worksheet', () => {
    expect(before.moved).toEqual(new Set());
  });

  it('is what is shown otherwise than before, but not what is new', () => {
    expect(nextSheet(before, moved, '').moved).toEqual(new Set(['e_ss']));
  });

  it('keeps the baseline from report to report until it is let go', () => {
    const pinned = withBaseline(before, '', true);
    const later = nextSheet(pinned, moved, '');
    expect(later.baseline).toBe(pinned.baseline);
    expect(withBaseline(later, '', false).baseline).toBeNull();
  });
});
