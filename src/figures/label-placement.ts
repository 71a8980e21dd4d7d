import type { Line, Point } from './data.ts';
import type { Box } from './scale.ts';

/** A label that wants to stand beside a line. Sizes and positions are in pixels. */
export interface LineLabel {
  readonly width: number;
  readonly height: number;
  readonly lines: readonly Line[];
}

/** Distance between a line and its label, and between positions tried along a line. */
const GAP = 6;
const STEP = 14;

/**
 * What a position costs: worst is another label; then a line through the text, or another's line as near as the own
 * one, which makes it doubtful whose label it is; then standing at a short piece, at its end, or near the frame.
 */
const COSTS = { label: 1000, line: 40, doubt: 20, short: 12, end: 6, frame: 8, light: 0.2 };

/**
 * A box for each label, beside one of its lines, inside the frame, on as few other things as can be; null for a label
 * that has no line or no room. Labels are placed in order, each avoiding those before it.
 *
 * @param light lines that labels need not quite so much avoid
 * @param occupied boxes that no label may cover, such as a marked point
 */
export function placeLabels(
  labels: readonly LineLabel[],
  frame: Box,
  light: readonly Line[] = [],
  occupied: readonly Box[] = [],
): readonly (Box | null)[] {
  const taken = [...occupied];
  return labels.map((label) => {
    const others = labels.filter((other) => other !== label).flatMap(({ lines }) => lines);
    const scene: Scene = { own: label.lines, others, light, taken, frame };
    const box = cheapest(candidatesFor(label, frame), scene);
    if (box !== null) taken.push(box);
    return box;
  });
}

/** What a label's place is judged by. */
interface Scene {
  readonly own: readonly Line[];
  readonly others: readonly Line[];
  readonly light: readonly Line[];
  readonly taken: readonly Box[];
  readonly frame: Box;
}

interface Candidate {
  readonly box: Box;
  /** What the place on the line costs, apart from what is around it. */
  readonly cost: number;
}

function cheapest(candidates: readonly Candidate[], scene: Scene): Box | null {
  let best: Box | null = null;
  let lowest = COSTS.label;
  for (const { box, cost } of candidates) {
    const price = cost < lowest ? cost + surroundings(box, scene) : Infinity;
    if (price < lowest) [best, lowest] = [box, price];
  }
  return best;
}

function candidatesFor(label: LineLabel, frame: Box): readonly Candidate[] {
  const lengths = label.lines.map(lengthOf);
  const longest = Math.max(1, ...lengths);
  return label.lines.flatMap((line, i) => {
    const short = COSTS.short * (1 - lengths[i] / longest);
    const places = stations(line);
    return places.flatMap(({ at, normal }, k) => {
      const offCentre = Math.abs((2 * k + 1) / places.length - 1);
      const cost = short + COSTS.end * offCentre;
      const boxes = [beside(label, at, normal, 1), beside(label, at, normal, -1)];
      return boxes.filter((box) => isInside(box, frame)).map((box) => ({ box, cost }));
    });
  });
}

function lengthOf(line: Line): number {
  return line.reduce((length, [x, y], i) => {
    if (i === 0) return 0;
    return length + Math.hypot(x - line[i - 1][0], y - line[i - 1][1]);
  }, 0);
}

/** Points along a line at equal steps, with the direction across it. */
function stations(line: Line): readonly { at: Point; normal: Point }[] {
  const found: { at: Point; normal: Point }[] = [];
  let left = STEP / 2;
  for (let i = 1; i < line.length; i++) {
    const [ax, ay] = line[i - 1];
    const [dx, dy] = [line[i][0] - ax, line[i][1] - ay];
    const length = Math.hypot(dx, dy);
    for (; left <= length && length > 0; left += STEP) {
      const along = left / length;
      const at = [ax + along * dx, ay + along * dy] as const;
      found.push({ at, normal: [-dy / length, dx / length] });
    }
    left -= length;
  }
  return found;
}

/** The box on one side of a line, touching it with the corner or edge that is nearest. */
function beside(label: LineLabel, [x, y]: Point, normal: Point, side: 1 | -1): Box {
  const [nx, ny] = [normal[0] * side, normal[1] * side];
  const reach = Math.abs(nx) * label.width * 0.5 + Math.abs(ny) * label.height * 0.5 + GAP;
  const [cx, cy] = [x + nx * reach, y + ny * reach];
  return {
    left: cx - label.width / 2,
    right: cx + label.width / 2,
    top: cy - label.height / 2,
    bottom: cy + label.height / 2,
  };
}

function surroundings(box: Box, scene: Scene): number {
  const covered = scene.taken.filter((other) => overlaps(box, other)).length;
  const crossed = (lines: readonly Line[], room: number): number =>
    lines.filter((line) => crosses(line, grown(box, room))).length;
  const crossings =
    crossed(scene.own, 0) + crossed(scene.others, 0) + COSTS.light * crossed(scene.light, 0);
  return (
    covered * COSTS.label +
    crossings * COSTS.line +
    crossed(scene.others, GAP) * COSTS.doubt +
    nearness(box, scene.frame) * COSTS.frame
  );
}

function grown(box: Box, room: number): Box {
  return {
    left: box.left - room,
    right: box.right + room,
    top: box.top - room,
    bottom: box.bottom + room,
  };
}

/** 1 at the frame, falling to 0 a text height away from it. */
function nearness(box: Box, frame: Box): number {
  const room = Math.min(
    box.left - frame.left,
    frame.right - box.right,
    box.top - frame.top,
    frame.bottom - box.bottom,
  );
  return Math.max(0, 1 - room / (box.bottom - box.top));
}

function isInside(box: Box, frame: Box): boolean {
  return (
    box.left >= frame.left + 2 &&
    box.right <= frame.right &&
    box.top >= frame.top &&
    box.bottom <= frame.bottom - 2
  );
}

/** Whether two boxes share an inner point. */
export function overlaps(a: Box, b: Box): boolean {
  return a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom;
}

function crosses(line: Line, box: Box): boolean {
  return line.some((point, i) => i > 0 && segmentMeets(line[i - 1], point, box));
}

/**
 * Whether a segment meets a box.
 *
 * Source: Y.-D. Liang and B. Barsky, "A new concept and method for line clipping", 1984.
 */
function segmentMeets([ax, ay]: Point, [bx, by]: Point, box: Box): boolean {
  const [dx, dy] = [bx - ax, by - ay];
  const sides: readonly Point[] = [
    [-dx, ax - box.left],
    [dx, box.right - ax],
    [-dy, ay - box.top],
    [dy, box.bottom - ay],
  ];
  let [enter, leave] = [0, 1];
  for (const [p, q] of sides) {
    if (p === 0 && q < 0) return false;
    if (p < 0) enter = Math.max(enter, q / p);
    if (p > 0) leave = Math.min(leave, q / p);
  }
  return enter <= leave;
}
