import { createSession } from '../engine/index.ts';
import { createAnswering } from './answering.ts';
import type { UpdateMessage } from './protocol.ts';

const answer = createAnswering(() => createSession({}));

self.onmessage = (event: MessageEvent<UpdateMessage>) => self.postMessage(answer(event.data));
