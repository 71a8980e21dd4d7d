import { createSession, vocabulary } from '../engine/index.ts';
import { createAnswering } from './answering.ts';
import type { UpdateMessage, WorkerMessage } from './protocol.ts';

const answer = createAnswering(() => createSession());
const say = (message: WorkerMessage) => self.postMessage(message);

self.onmessage = (event: MessageEvent<UpdateMessage>) => say(answer(event.data));

say({ kind: 'vocabulary', words: vocabulary() });
