import type { Report, VocabularyWord } from '../engine/index.ts';
import { unpackReport, type UpdateMessage, type WorkerMessage } from './protocol.ts';

/** The part of a Worker that the client uses, so that tests can stand in for it. */
export interface WorkerPort {
  postMessage(message: UpdateMessage): void;
  onmessage: ((event: { readonly data: WorkerMessage }) => void) | null;
  onerror: ((event: { readonly message: string }) => void) | null;
  terminate(): void;
}

/**
 * What the evaluator is doing with the newest text: `current` (its report is the one shown), `computing`, `stopped`
 * (it took longer than the client's patience and was ended), `failed` (a bug of ours, with its message).
 */
export type EvaluatorState =
  | { readonly kind: 'current' }
  | { readonly kind: 'computing' }
  | { readonly kind: 'stopped'; readonly seconds: number }
  | { readonly kind: 'failed'; readonly message: string };

export interface ClientOptions {
  readonly startWorker: () => WorkerPort;
  /** Called with the report of the newest text only. */
  readonly onReport: (report: Report) => void;
  readonly onState: (state: EvaluatorState) => void;
  readonly onVocabulary?: (words: readonly VocabularyWord[]) => void;
  /** Seconds that one revision may take before the worker is ended; 10 unless given. */
  readonly patienceSeconds?: number;
}

export interface EvaluatorClient {
  /** Asks for the report of a text; `fresh` when it is another worksheet's. */
  update(text: string, fresh?: boolean): void;
  /** Ends the worker. */
  close(): void;
}

/**
 * The page's side of the protocol. One revision is with the worker at a time; while it is busy only the newest text
 * waits, so that the newest wins and the answer to an older one is dropped. A worker that does not answer within
 * the patience is ended and the state says so; the next change of the text starts another.
 */
export function createClient(options: ClientOptions): EvaluatorClient {
  return new Client(options);
}

class Client implements EvaluatorClient {
  private worker: WorkerPort | null = null;
  private revision = 0;
  private inFlight: UpdateMessage | null = null;
  private waiting: UpdateMessage | null = null;
  private timer: ReturnType<typeof setTimeout> | null = null;
  /** The last report that the worker sent, shown or not: the base of the next one. */
  private base: Report | null = null;
  private readonly patience: number;

  constructor(private readonly options: ClientOptions) {
    this.patience = options.patienceSeconds ?? 10;
  }

  update(text: string, fresh = false): void {
    this.revision += 1;
    const message: UpdateMessage = {
      kind: 'update',
      revision: this.revision,
      text,
      fresh: fresh || (this.waiting?.fresh ?? false),
    };
    this.options.onState({ kind: 'computing' });
    if (this.inFlight) this.waiting = message;
    else this.post(message);
  }

  close(): void {
    this.worker?.terminate();
    this.settle();
    this.worker = null;
    this.waiting = null;
  }

  private post(message: UpdateMessage): void {
    this.worker ??= this.start();
    if (message.fresh) this.base = null;
    this.inFlight = message;
    this.timer = setTimeout(() => this.giveUp(), this.patience * 1000);
    this.worker.postMessage(message);
  }

  private start(): WorkerPort {
    const worker = this.options.startWorker();
    worker.onmessage = (event) => {
      if (worker === this.worker) this.receive(event.data);
    };
    worker.onerror = (event) => {
      if (worker === this.worker) this.replace({ kind: 'failed', message: event.message });
    };
    this.base = null;
    return worker;
  }

  private receive(message: WorkerMessage): void {
    if (message.kind === 'vocabulary') {
      this.options.onVocabulary?.(message.words);
      return;
    }
    this.settle();
    if (message.kind === 'failure') this.base = null;
    else this.base = unpackReport(this.base, message.report);
    if (this.waiting) return this.postWaiting();
    if (message.kind === 'failure') {
      this.options.onState({ kind: 'failed', message: message.message });
    } else if (this.base) {
      this.options.onState({ kind: 'current' });
      this.options.onReport(this.base);
    }
  }

  private giveUp(): void {
    this.replace({ kind: 'stopped', seconds: this.patience });
  }

  /** Ends the worker; goes on with the text that waits, or says the state if none does. */
  private replace(state: EvaluatorState): void {
    this.worker?.terminate();
    this.worker = null;
    this.settle();
    if (this.waiting) this.postWaiting();
    else this.options.onState(state);
  }

  private postWaiting(): void {
    const message = this.waiting;
    this.waiting = null;
    if (message) this.post(message);
  }

  private settle(): void {
    if (this.timer !== null) clearTimeout(this.timer);
    this.timer = null;
    this.inFlight = null;
  }
}
