import { expect, it } from 'vitest';
import { overlaps, placeLabels } from '../../src/figures/label-placement.ts';

const frame = { left: 0, top: 0, right: 600, bottom: 400 };
const label = (...lines: readonly (readonly [number, number])[][]) => ({
  width: 90,
  height: 18,
  lines,
});

it('Labels of lines that run close together do not overlap.', () => {
  const boxes = placeLabels(
    [200, 212, 224, 236].map((y) =>
      label([
        [0, y],
        [600, y],
      ]),
    ),
    frame,
  );
  boxes.forEach((box, i) => {
    if (box === null) throw new Error(`label ${i} was not placed`);
    for (const other of boxes.slice(i + 1)) expect(other && overlaps(box, other)).toBe(false);
  });
});

it('A label stays inside the frame and off a marked point.', () => {
  const point = { left: 280, right: 320, top: 20, bottom: 60 };
  const line = [
    [150, 6],
    [450, 6],
  ] as const;
  const [box] = placeLabels([label([...line])], frame, [], [point]);
  expect(box).not.toBeNull();
  expect(box && overlaps(box, point)).toBe(false);
  expect(box?.top).toBeGreaterThanOrEqual(0);
});

it('A label without a line has no place.', () => {
  expect(placeLabels([label()], frame)).toEqual([null]);
});
