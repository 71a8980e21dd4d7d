export {
  createClient,
  type ClientOptions,
  type EvaluatorClient,
  type EvaluatorState,
  type WorkerPort,
} from './client.ts';
export { startEvaluator } from './start.ts';
