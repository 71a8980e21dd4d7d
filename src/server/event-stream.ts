import type { FolderChange, FolderWatch } from './watch.ts';

const HEARTBEAT_MILLISECONDS = 20_000;

/**
 * The changes of a folder as server-sent events: `added` and `changed` with {name, hash}, `removed` with {name}. The
 * first line comes once the watch stands, so that nothing after it is missed.
 */
export function eventStream(watch: FolderWatch): ReadableStream<Uint8Array> {
  const encoder = new TextEncoder();
  let stop = () => {};
  let cancelled = false;
  return new ReadableStream<Uint8Array>({
    async start(controller) {
      const send = (text: string) => {
        if (!cancelled) controller.enqueue(encoder.encode(text));
      };
      const stopListening = await watch.listen((change) => send(eventText(change)));
      const heartbeat = setInterval(() => send(': still here\n\n'), HEARTBEAT_MILLISECONDS);
      stop = () => {
        clearInterval(heartbeat);
        stopListening();
      };
      if (cancelled) stop();
      send('retry: 1000\nevent: ready\ndata: {}\n\n');
    },
    cancel() {
      cancelled = true;
      stop();
    },
  });
}

function eventText({ kind, ...data }: FolderChange): string {
  return `event: ${kind}\ndata: ${JSON.stringify(data)}\n\n`;
}
