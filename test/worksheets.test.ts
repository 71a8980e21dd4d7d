import { readdirSync, readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { invariant } from '../src/base/index.ts';
import { createSession } from '../src/engine/index.ts';
import type { Report, RequirementContent, ResultContent } from '../src/engine/report.ts';

const FOLDER = 'worksheets';
const FILES = readdirSync(FOLDER).filter((name) => name.endsWith('.md'));

const reports = new Map<string, Report>(
  FILES.map((name) => [
    name,
    createSession().update(readFileSync(`${FOLDER}/${name}`, { encoding: 'utf8' })),
  ]),
);

function reportOn(file: string): Report {
  const report = reports.get(file);
  invariant(report, `there is no worksheet ${file}`);
  return report;
}

function result(file: string, name: string): ResultContent {
  const row = reportOn(file).results.find(({ content }) => content.name === name);
  invariant(row, `${file} has no result ${name}`);
  return row.content;
}

function requirement(file: string, label: string): RequirementContent {
  const row = reportOn(file).requirements.find(
    ({ content }) => content.label?.startsWith(`${label} `) === true,
  );
  invariant(row, `${file} has no requirement ${label}`);
  return row.content;
}

describe.each(FILES)('%s', (file) => {
  const { problems, results, references, assumptions } = reportOn(file);

  it('evaluates without a problem', () => {
    expect(problems).toEqual([]);
    expect(results.filter(({ content }) => content.state === 'error')).toEqual([]);
  });

  it('has a value for every name in its prose', () => {
    expect(references.filter(({ shown }) => shown === null)).toEqual([]);
  });

  it('uses every assumption that it makes', () => {
    const unused = assumptions.filter(({ content }) => !content.used);
    expect(unused.map(({ content }) => content.name)).toEqual([]);
  });

  it('has no result that is refuted', () => {
    const refuted = results.filter(
      ({ content, from }) => content.value === false && isIdentity(file, from),
    );
    expect(refuted).toEqual([]);
  });
});

function isIdentity(file: string, from: number): boolean {
  return readFileSync(`${FOLDER}/${file}`, { encoding: 'utf8' }).startsWith('same(', from);
}

/** The verdicts that the prose speaks of; all others are met. */
const NOT_SIMPLY_MET: Readonly<Record<string, Readonly<Record<string, string>>>> = {
  'belt-drive.md': { 'B-2': 'met at nominal only', 'B-4': 'met at nominal only', 'B-5': 'not met' },
  'boat-mast.md': { 'T-2': 'met at nominal only' },
  'greenhouse-heater.md': { 'H-4': 'met at nominal only' },
  'hill-top-dish.md': { 'R-3': 'not met', 'R-5': 'met at nominal only' },
  'tank-level.md': { 'L-5': 'met at nominal only' },
  'warehouse-lift.md': { 'W-5': 'met at nominal only' },
};

it.each(FILES)('the verdicts of %s are those that its prose draws conclusions from', (file) => {
  const others = reportOn(file)
    .requirements.filter(({ content }) => content.verdict !== 'met')
    .map(({ content }) => [content.label!.split(' ')[0], content.verdict]);
  expect(Object.fromEntries(others)).toEqual(NOT_SIMPLY_MET[file]);
});

/** Closed forms by hand: a torque balance, a volume balance, Newton's second law; Routh's condition a₁ a₂ > a₀ a₃. */
describe('numbers worked by hand', () => {
  it.each<[file: string, name: string, value: number]>([
    // 0 = T + w at rest, and T = Kp e without the integral term
    ['hill-top-dish.md', 'e_two', -(260 + 60) / 9000],
    // the integral term follows a torque R t with the error R/Ki
    ['hill-top-dish.md', 'e_front', -25 / 12000],
    // J s³ + (b + Kd) s² + Kp s + Ki: stable for Ki < Kp (b + Kd)/J
    ['hill-top-dish.md', 'Ki_limit', (9000 * (35 + 4100)) / 480],
    // A t²/2 is followed with the error A/(Ki/(b + Kd))
    ['hill-top-dish.md', 'e_flight', (1e-4 * (35 + 4100)) / 12000],
    // k d = −m a − F: the spring carries the inertia and the wind
    ['boat-mast.md', 'd_way', -(14 * 2.5 + 60) / 22000],
    ['boat-mast.md', 'f_m', Math.sqrt(22000 / 14) / (2 * Math.PI)],
    ['boat-mast.md', 'zeta_m', 420 / (2 * Math.sqrt(22000 * 14))],
    // the stiffness Kp is left once Kg has cancelled the toppling moment
    ['boat-mast.md', 'phi_way', (9 * 0.035 * 2.5 + 0.4) / (0.85 * 14 ** 2)],
    // the integral term follows an inflow R t with the error R/Ki; three presses an hour
    ['tank-level.md', 'e_morning', -(3 * 0.35e-3) / 3600 / 20e-6],
    ['tank-level.md', 'e_hour', (2.5 * 0.35e-3 * 7200) / 3600 ** 2 / 20e-6],
    // τ² s³ + 2 τ s² + (1 + Kp R) s + Ki R: stable for Ki R τ² < 2 τ (1 + Kp R)
    ['tank-level.md', 'Ki_limit', (2 * (1 + 12e-3 * 180)) / (2.4 * 180 ** 2)],
    ['belt-drive.md', 'f_r', Math.sqrt(900 * (1 / 0.012 + 1 / 0.06)) / (2 * Math.PI)],
    ['belt-drive.md', 'wind_up', 4 / 900],
    // the torque (J1 + J2) α of an acceleration α = j t, by the integral term alone
    ['belt-drive.md', 'e_run', (0.072 * 40) / 6],
    // Kp e = v, and the height arrives late by Td
    ['warehouse-lift.md', 'lag_r', 0.6 / 3.2 - 0.6 * 0.024],
    // moment balance of two belts: 2 k h² phi = −a W
    ['warehouse-lift.md', 'phi_L', (-0.25 * 1500) / (2 * 250e3 * 0.9 ** 2)],
    ['warehouse-lift.md', 'omega_t', Math.sqrt((2 * 250e3 * 0.9 ** 2) / 110)],
    // coefficient matching: C s² + (U + G + G Kp) s + G Ki = C (s² + 2 zeta omega s + omega²)
    ['greenhouse-heater.md', 'Kp', (2 * 0.9 * 4e-3 * 1.8e6 - 2400 - 3100) / 3100],
    ['greenhouse-heater.md', 'Ki', (1.8e6 * 4e-3 ** 2) / 3100],
    // heat balance at rest: G u = U T_f
    ['greenhouse-heater.md', 'u_night', (2400 * 18) / 3100],
  ])('%s: %s', (file, name, value) => {
    const { value: found } = result(file, name);
    invariant(typeof found === 'number', `${name} has no number`);
    expect(found / value).toBeCloseTo(1, 12);
  });

  it.each<[file: string, label: string, worst: number]>([
    ['hill-top-dish.md', 'R-5', 400 + 80],
    ['hill-top-dish.md', 'R-6', (25 + 10) / 12],
    ['boat-mast.md', 'M-2', ((14.5 * 3.5 + 90) / (22000 * 0.85)) * 1e3],
    ['tank-level.md', 'L-5', (2.5 * 1.4 * 0.35e-3 * 7200) / 3600 ** 2 / 20e-6 / 1e-3],
    ['belt-drive.md', 'B-4', (6 / (900 * 0.8)) * 1e3],
    ['warehouse-lift.md', 'W-5', ((0.25 * 2500) / (2 * 250e3 * 0.85 * 0.9 ** 2)) * 1e3],
    ['greenhouse-heater.md', 'H-4', (2400 * 1.1 * 20) / (3100 * 0.95)],
  ])('%s: the worst case of %s', (file, label, worst) => {
    expect(requirement(file, label).worst! / worst).toBeCloseTo(1, 12);
  });

  it('the roller-side gain limit of the belt drive is where the cubic of its loop has a pair on the axis', () => {
    // J1 J2 s³ + c (J1 + J2) s² + (k (J1 + J2) + c K) s + k K: c J (k J + c K) = J1 J2 k K, with J = J1 + J2
    const [J1, J2, k, c] = [0.012, 0.06, 900, 0.6];
    const limit = (c * k * (J1 + J2) ** 2) / (J1 * J2 * k - c ** 2 * (J1 + J2));
    const solved = reportOn('belt-drive.md').results.find(
      ({ content }) => content.formula?.startsWith('0 < Kv < ') === true,
    );
    expect(solved?.content.formula).toBe(`0 < Kv < ${limit === 4.5 ? '9/2' : limit}`);
  });
});
