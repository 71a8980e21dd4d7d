import type { Report, Session } from '../engine/index.ts';
import { packReport, type UpdateMessage, type WorkerMessage } from './protocol.ts';

/**
 * The worker's side of the protocol: a function from an update to its answer. It keeps the session and the report
 * that the other side holds; a bug in the evaluator becomes a failure message and a new session.
 */
export function createAnswering(
  startSession: () => Pick<Session, 'update'>,
): (update: UpdateMessage) => WorkerMessage {
  let session: Pick<Session, 'update'> | null = null;
  let sent: Report | null = null;
  return ({ revision, text, fresh }) => {
    try {
      if (!session || fresh) {
        session = startSession();
        sent = null;
      }
      const report = session.update(text);
      const packed = packReport(sent, report);
      sent = report;
      return { kind: 'report', revision, report: packed };
    } catch (error) {
      session = null;
      sent = null;
      return { kind: 'failure', revision, message: wordsOf(error) };
    }
  };
}

function wordsOf(error: unknown): string {
  return error instanceof Error ? error.message : String(error);
}
