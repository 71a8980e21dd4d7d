import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import type { Report, Session } from '../../src/engine/index.ts';
import { createAnswering } from '../../src/worker/answering.ts';
import { createClient, type EvaluatorState, type WorkerPort } from '../../src/worker/client.ts';
import type { UpdateMessage } from '../../src/worker/protocol.ts';

type Updating = Pick<Session, 'update'>;

/** A session whose report names the text as its only reference. */
const echo: Updating = { update: (text) => echoReport(text) };

function echoReport(text: string): Report {
  const references = [{ from: 0, to: text.length, name: text, shown: null }];
  return { results: [], requirements: [], assumptions: [], problems: [], references, loops: [] };
}

/** A worker that answers when told to. */
class ManualWorker implements WorkerPort {
  onmessage: WorkerPort['onmessage'] = null;
  onerror: WorkerPort['onerror'] = null;
  readonly received: UpdateMessage[] = [];
  ended = false;
  private readonly answering;

  constructor(session: Updating = echo) {
    this.answering = createAnswering(() => session);
  }

  postMessage(message: UpdateMessage): void {
    this.received.push(message);
  }

  answer(): void {
    const message = this.received.at(-1);
    if (message) this.onmessage?.({ data: structuredClone(this.answering(message)) });
  }

  terminate(): void {
    this.ended = true;
  }
}

function setUp(session?: Updating) {
  const workers: ManualWorker[] = [];
  const reports: string[] = [];
  const states: EvaluatorState[] = [];
  const client = createClient({
    startWorker: () => {
      const worker = new ManualWorker(session);
      workers.push(worker);
      return worker;
    },
    onReport: (report) => reports.push(report.references[0]?.name ?? ''),
    onState: (state) => states.push(state),
  });
  return { client, workers, reports, states };
}

describe('client of the evaluator', () => {
  beforeEach(() => void vi.useFakeTimers());
  afterEach(() => void vi.useRealTimers());

  it('reports the text that it was given', () => {
    const { client, workers, reports, states } = setUp();
    client.update('a');
    workers[0]?.answer();
    expect(reports).toEqual(['a']);
    expect(states).toEqual([{ kind: 'computing' }, { kind: 'current' }]);
  });

  it('keeps only the newest text while the worker is busy, and drops the stale answer', () => {
    const { client, workers, reports } = setUp();
    for (const text of ['a', 'b', 'c']) client.update(text);
    expect(workers[0]?.received.map(({ text }) => text)).toEqual(['a']);
    workers[0]?.answer();
    expect(reports).toEqual([]);
    expect(workers[0]?.received.map(({ text }) => text)).toEqual(['a', 'c']);
    workers[0]?.answer();
    expect(reports).toEqual(['c']);
  });

  it('does not lose that another worksheet was opened when that text is overtaken', () => {
    const { client, workers } = setUp();
    client.update('a');
    client.update('b', true);
    client.update('c');
    workers[0]?.answer();
    expect(workers[0]?.received.at(-1)).toMatchObject({ text: 'c', fresh: true });
  });

  it('ends a worker that does not answer in ten seconds, says so, and starts another at the next change', () => {
    const { client, workers, reports, states } = setUp();
    client.update('a');
    vi.advanceTimersByTime(9_999);
    expect(workers[0]?.ended).toBe(false);
    vi.advanceTimersByTime(1);
    expect(workers[0]?.ended).toBe(true);
    expect(states.at(-1)).toEqual({ kind: 'stopped', seconds: 10 });
    workers[0]?.answer();
    expect(reports).toEqual([]);
    client.update('b');
    workers[1]?.answer();
    expect(reports).toEqual(['b']);
  });

  it('goes on with the text that waits when the worker is ended', () => {
    const { client, workers, states } = setUp();
    client.update('a');
    client.update('b');
    vi.advanceTimersByTime(10_000);
    expect(states.at(-1)).toEqual({ kind: 'computing' });
    expect(workers[1]?.received.map(({ text }) => text)).toEqual(['b']);
  });

  it('says a failure of the evaluator as such and recovers with the next text', () => {
    let broken = true;
    const { client, workers, reports, states } = setUp({
      update: (text) => {
        if (broken) throw new Error('internal error: no pivot');
        return echoReport(text);
      },
    });
    client.update('a');
    workers[0]?.answer();
    expect(states.at(-1)).toEqual({ kind: 'failed', message: 'internal error: no pivot' });
    broken = false;
    client.update('b');
    workers[0]?.answer();
    expect(reports).toEqual(['b']);
  });
});
