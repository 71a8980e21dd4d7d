import { describe, expect, it } from 'vitest';
import type { Report } from '../../src/engine/index.ts';
import { packReport, unpackReport } from '../../src/worker/protocol.ts';

function reportOf(contents: readonly object[], from = 0): Report {
  const results = contents.map((content, index) => ({
    from: from + index,
    to: from + index + 1,
    line: index + 1,
    content,
  })) as unknown as Report['results'];
  return { results, requirements: [], assumptions: [], problems: [], references: [], loops: [] };
}

describe('packing of reports', () => {
  const [a, b, c] = [{ name: 'a' }, { name: 'b' }, { name: 'c' }];

  it('sends every row whole when nothing was sent before', () => {
    expect(packReport(null, reportOf([a, b]))).toEqual(reportOf([a, b]));
  });

  it('sends an unchanged content as its index in the report before, at its new place', () => {
    const packed = packReport(reportOf([a, b]), reportOf([c, b, a], 10));
    expect(packed.results).toEqual([
      { from: 10, to: 11, line: 1, content: c },
      { from: 11, to: 12, line: 2, same: 1 },
      { from: 12, to: 13, line: 3, same: 0 },
    ]);
  });

  it('restores the report, with unchanged contents being the objects already held', () => {
    const held = unpackReport(null, structuredClone(packReport(null, reportOf([a, b]))));
    const packed = structuredClone(packReport(reportOf([a, b]), reportOf([b, c], 5)));
    const restored = unpackReport(held, packed);
    expect(restored).toEqual(reportOf([b, c], 5));
    expect(restored.results[0]?.content).toBe(held.results[1]?.content);
  });

  it('throws where the report before lacks the row that is referred to', () => {
    const packed = packReport(reportOf([a]), reportOf([a]));
    expect(() => unpackReport(null, packed)).toThrow('row 0 of the report before is not there');
  });
});
