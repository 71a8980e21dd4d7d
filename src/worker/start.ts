import type { WorkerPort } from './client.ts';

/** Starts the evaluator in a worker of its own. */
export function startEvaluator(): WorkerPort {
  return new Worker(new URL('./worker.ts', import.meta.url), { type: 'module', name: 'evaluator' });
}
