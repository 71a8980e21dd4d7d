import type { WorkerPort } from './client.ts';

/** Starts the evaluator in a worker of its own. */
export function startEvaluator(): WorkerPort {
  const worker = new Worker(new URL('./worker.ts', import.meta.url), {
    type: 'module',
    name: 'evaluator',
  });
  const port: WorkerPort = {
    postMessage: (message) => worker.postMessage(message),
    terminate: () => worker.terminate(),
    onmessage: null,
    onerror: null,
  };
  worker.onmessage = (event) => port.onmessage?.(event);
  worker.onerror = (event) => port.onerror?.(event);
  return port;
}
