import { invariant } from '../base/index.ts';

/**
 * Demand-driven incremental computation with cut-off.
 *
 * A query is a key with a function that computes its value from inputs and other queries. What it reads is recorded
 * while it runs. After a change of inputs a query is looked at again only when asked for; it runs again only when
 * something that it read really changed, and when its new value equals its old one its readers are left alone.
 *
 *     input ──▶ query ──▶ query      changedAt: revision of the last real change
 *                 ╰─────▶ query      verifiedAt: revision in which it was last found current
 */
interface Memo {
  value: unknown;
  compute: () => unknown;
  equal: (a: unknown, b: unknown) => boolean;
  reads: Set<Memo>;
  changedAt: number;
  verifiedAt: number;
  running: boolean;
}

/** Unused memos are dropped after so many revisions. */
const KEEP_REVISIONS = 64;

export class Queries {
  private revision = 1;
  private evaluations = 0;
  private readonly memos = new Map<string, Memo>();
  private readonly inputs = new Map<string, Memo>();
  private readonly running: Memo[] = [];

  /** How many query functions have run, for tests that count evaluations. */
  get evaluationCount(): number {
    return this.evaluations;
  }

  /** Begins a revision: sets inputs, then forgets what no recent revision asked for. */
  advance(values: ReadonlyMap<string, unknown>): void {
    this.revision++;
    for (const [key, value] of values) this.setInput(key, value);
    for (const [key, memo] of this.memos) {
      if (memo.verifiedAt < this.revision - KEEP_REVISIONS) this.memos.delete(key);
    }
  }

  /** The value of an input; reading one that was never set is a bug. */
  input<T>(key: string): T {
    const memo = this.inputs.get(key);
    invariant(memo, `the input ${key} was read before it was set`);
    this.record(memo);
    return memo.value as T;
  }

  /** The current value of a query. `equal` decides whether a new value counts as a change. */
  get<T>(key: string, compute: () => T, equal: (a: T, b: T) => boolean = Object.is): T {
    const known = this.memos.get(key);
    const memo: Memo = known ?? {
      value: undefined,
      compute,
      equal: equal as Memo['equal'],
      reads: new Set(),
      changedAt: 0,
      verifiedAt: 0,
      running: false,
    };
    if (!known) this.memos.set(key, memo);
    memo.compute = compute;
    this.refresh(memo, key);
    this.record(memo);
    return memo.value as T;
  }

  private setInput(key: string, value: unknown): void {
    const memo = this.inputs.get(key);
    if (!memo) {
      this.inputs.set(key, {
        value,
        compute: () => value,
        equal: Object.is,
        reads: new Set(),
        changedAt: this.revision,
        verifiedAt: Infinity,
        running: false,
      });
    } else if (memo.value !== value) {
      memo.value = value;
      memo.changedAt = this.revision;
    }
  }

  private record(memo: Memo): void {
    this.running.at(-1)?.reads.add(memo);
  }

  private refresh(memo: Memo, key: string): void {
    if (memo.verifiedAt >= this.revision) return;
    invariant(!memo.running, `the query ${key} reads itself`);
    if (memo.verifiedAt > 0 && !this.readsChanged(memo)) {
      memo.verifiedAt = this.revision;
      return;
    }
    this.run(memo);
  }

  private readsChanged(memo: Memo): boolean {
    for (const read of memo.reads) {
      if (read.verifiedAt < this.revision) this.refresh(read, 'of a reader');
      if (read.changedAt > memo.verifiedAt) return true;
    }
    return false;
  }

  private run(memo: Memo): void {
    const before = memo.reads;
    memo.running = true;
    memo.reads = new Set();
    this.running.push(memo);
    this.evaluations++;
    try {
      const value = memo.compute();
      if (memo.verifiedAt === 0 || !memo.equal(memo.value, value)) {
        memo.value = value;
        memo.changedAt = this.revision;
      }
      memo.verifiedAt = this.revision;
    } catch (error) {
      memo.reads = before;
      memo.verifiedAt = 0;
      throw error;
    } finally {
      memo.running = false;
      this.running.pop();
    }
  }
}
